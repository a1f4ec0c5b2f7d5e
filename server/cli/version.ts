import { version as packageVersion } from "../../package.json";

/** Version of the engine, as tuned files and proofs name it. */
export const version: string = packageVersion;
