import { type ChildProcess, spawn } from "node:child_process";
import { once } from "node:events";
import { mkdtemp, rm } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { eventually } from "#tests/helpers/workshop.ts";

const PASSWORD = "correct horse battery";

/** Server and worker bundled as they are shipped, in a folder of their own below the project. */
export async function bundleServer(): Promise<string> {
  const root = join(import.meta.dirname, "..", "..");
  const { bundle } = await import(join(root, "server", "bundle.mjs"));
  const { PROGRAMS } = await import(join(root, "server", "built.mjs"));
  const folder = await mkdtemp(join(root, "node_modules", ".test-server-"));
  await bundle(PROGRAMS, folder);
  return folder;
}

/** The server as a process, with the demo team and a data folder that outlives it. */
export class RealServer {
  readonly dataDir: string;
  private readonly bundleDir: string;
  private process: ChildProcess | undefined;
  private cookie = "";
  url = "";
  output = "";

  private constructor(bundleDir: string, dataDir: string) {
    this.bundleDir = bundleDir;
    this.dataDir = dataDir;
  }

  static async make(bundleDir: string): Promise<RealServer> {
    return new RealServer(bundleDir, await mkdtemp(join(tmpdir(), "quenchline-real-")));
  }

  /** Starts it and signs the engineer in. */
  async start(variables: Record<string, string> = {}): Promise<void> {
    const env = {
      ...process.env,
      DATA_DIR: this.dataDir,
      PORT: "0",
      DEMO_PASSWORD: PASSWORD,
      LOG_LEVEL: "info",
      ...variables,
    };
    this.output = "";
    const child = spawn(process.execPath, [join(this.bundleDir, "index.mjs")], {
      env,
      stdio: ["ignore", "pipe", "pipe"],
    });
    this.process = child;
    for (const stream of [child.stdout, child.stderr]) stream.on("data", (text: Buffer) => (this.output += text));
    const ready = /ready at (\S+)/;
    await eventually(
      async () => this.output,
      (text) => ready.test(text) || child.exitCode !== null || child.signalCode !== null,
      240_000,
    );
    const url = ready.exec(this.output)?.[1];
    if (url === undefined) throw new Error(`the server did not start: ${this.output}`);
    this.url = url;
    const email = "engineer@alderbay.example";
    const reply = await this.fetch("/api/session", { method: "POST", ...json({ email, password: PASSWORD }) });
    if (!reply.ok) throw new Error(`no session: ${await reply.text()}`);
    this.cookie = reply.headers.getSetCookie()[0].split(";")[0];
  }

  fetch(path: string, init: RequestInit = {}): Promise<Response> {
    return fetch(this.url + path, { ...init, headers: { ...init.headers, cookie: this.cookie } });
  }

  // biome-ignore lint/suspicious/noExplicitAny: the replies of many endpoints
  async json(path: string, init?: RequestInit): Promise<any> {
    const reply = await this.fetch(path, init);
    if (!reply.ok) throw new Error(`${path}: ${reply.status} ${await reply.text()}`);
    return reply.json();
  }

  async machineId(name: string): Promise<string> {
    const machines: { id: string; name: string }[] = await this.json("/api/machines");
    return machines.find((machine) => machine.name === name)!.id;
  }

  // biome-ignore lint/suspicious/noExplicitAny: as above
  async upload(blob: Blob, name: string, machine = "Tern"): Promise<any> {
    const body = new FormData();
    body.append("file", blob, name);
    return this.json(`/api/toolpaths?machine=${await this.machineId(machine)}`, { method: "POST", body });
  }

  get pid(): number {
    return this.process!.pid!;
  }

  /** Ends the process at once, as a power cut would. */
  async kill(signal: NodeJS.Signals = "SIGKILL"): Promise<void> {
    const child = this.process;
    if (!child || child.exitCode !== null || child.signalCode !== null) return;
    const exited = once(child, "exit");
    child.kill(signal);
    await exited;
  }

  async remove(): Promise<void> {
    await this.kill();
    await rm(this.dataDir, { recursive: true, force: true });
  }
}

const json = (value: unknown): RequestInit => ({
  body: JSON.stringify(value),
  headers: { "content-type": "application/json" },
});
