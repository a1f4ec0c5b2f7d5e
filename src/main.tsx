import { config } from "zod/v4/core";

// The page's content policy forbids code made from text. Schemas look at this setting when they are made, so nothing that
// makes one may be imported before it: the rest of the program comes afterwards.
config({ jitless: true });
const { start } = await import("#src/app/start.tsx");
start();
