// Lets the compiler lay the reader's whole hot path into one loop, from bytes to planned moves: a tenth less time a line
// (npm run bench, analysis ÷ byte loop). Has to run before the engine does.
import { setFlagsFromString } from "node:v8";

setFlagsFromString("--max-inlined-bytecode-size=2000");
setFlagsFromString("--max-inlined-bytecode-size-cumulative=6000");
