/** Version of the engine, as tuned files and proofs name it. */
export { version } from "../../package.json";
