import { Worker } from "node:worker_threads";
import type { FromWorker, Task, TaskProgress, TaskResult, ToWorker, WorkerData } from "#server/jobs/tasks.ts";
import type { RefusalReport } from "#shared/contract/common.ts";

/** How a job in a worker ended. `failed`: thrown out of our own code, or the worker died or fell silent. */
export type Outcome =
  | { end: "done"; result: TaskResult }
  | { end: "refused"; refusal: RefusalReport }
  | { end: "cancelled" }
  | { end: "failed"; reason: string };

export interface WorkerLimits {
  /** a worker that says nothing for this long while it works is ended */
  silenceMs: number;
  /** a cancelled job that does not stop by itself within this time is stopped with its worker */
  cancelMs: number;
}

const HEAP_MB = 1024;

/** One long-lived thread that does one job at a time. When it dies, the next job starts a new one. */
export class WorkerThread {
  private readonly data: WorkerData;
  private readonly limits: WorkerLimits;
  private worker: Worker | undefined;

  constructor(data: WorkerData, limits: WorkerLimits) {
    this.data = data;
    this.limits = limits;
  }

  /** Starts the thread now, so that the first job need not wait for it. */
  warm(): void {
    this.worker ??= this.begin();
  }

  async run(
    job: string,
    task: Task,
    signal: AbortSignal,
    onProgress: (progress: TaskProgress) => void,
  ): Promise<Outcome> {
    if (signal.aborted) return { end: "cancelled" };
    this.warm();
    const worker = this.worker!;
    const outcome = await new Promise<Outcome>((resolve) => {
      const watch = new Watch(worker, this.limits, signal, onProgress, resolve);
      watch.send({ say: "run", job, task });
    });
    if (outcome.end === "failed") await this.close();
    return outcome;
  }

  async close(): Promise<void> {
    const { worker } = this;
    this.worker = undefined;
    await worker?.terminate();
  }

  private begin(): Worker {
    const worker = startWorker(this.data);
    const forget = (): void => {
      if (this.worker === worker) this.worker = undefined;
    };
    worker.on("exit", forget);
    // Whoever waits for a job hears of it; an idle worker that dies is simply started again.
    worker.on("error", forget);
    return worker;
  }
}

/** Follows one job in a worker until its last word, however that comes. */
class Watch {
  private readonly worker: Worker;
  private readonly limits: WorkerLimits;
  private readonly signal: AbortSignal;
  private readonly onProgress: (progress: TaskProgress) => void;
  private readonly resolve: (outcome: Outcome) => void;
  private silence: NodeJS.Timeout;
  private patience: NodeJS.Timeout | undefined;

  constructor(
    worker: Worker,
    limits: WorkerLimits,
    signal: AbortSignal,
    onProgress: (progress: TaskProgress) => void,
    resolve: (outcome: Outcome) => void,
  ) {
    this.worker = worker;
    this.limits = limits;
    this.signal = signal;
    this.onProgress = onProgress;
    this.resolve = resolve;
    worker.on("message", this.onMessage);
    worker.on("error", this.onError);
    worker.on("exit", this.onExit);
    signal.addEventListener("abort", this.onAbort);
    this.silence = this.waitForSign();
  }

  send(message: ToWorker): void {
    this.worker.postMessage(message);
  }

  private readonly onMessage = (message: FromWorker): void => {
    clearTimeout(this.silence);
    this.silence = this.waitForSign();
    if (message.say === "progress") this.onProgress(message.progress);
    else if (message.say !== "ready") this.end(outcomeOf(message));
  };

  private readonly onError = (error: unknown): void => {
    this.end({ end: "failed", reason: error instanceof Error ? (error.stack ?? error.message) : String(error) });
  };

  private readonly onExit = (status: number): void => {
    this.end(this.signal.aborted ? { end: "cancelled" } : { end: "failed", reason: `the worker ended with ${status}` });
  };

  private readonly onAbort = (): void => {
    this.send({ say: "cancel" });
    this.patience = setTimeout(() => void this.worker.terminate(), this.limits.cancelMs);
  };

  private waitForSign(): NodeJS.Timeout {
    const { silenceMs } = this.limits;
    return setTimeout(() => {
      this.end({ end: "failed", reason: `the worker gave no sign of life for ${silenceMs / 1000} s` });
    }, silenceMs);
  }

  private end(outcome: Outcome): void {
    clearTimeout(this.silence);
    clearTimeout(this.patience);
    this.worker.off("message", this.onMessage);
    this.worker.off("error", this.onError);
    this.worker.off("exit", this.onExit);
    this.signal.removeEventListener("abort", this.onAbort);
    this.resolve(outcome);
  }
}

function outcomeOf(message: Exclude<FromWorker, { say: "ready" | "progress" }>): Outcome {
  switch (message.say) {
    case "done":
      return { end: "done", result: message.result };
    case "refused":
      return { end: "refused", refusal: message.refusal };
    case "cancelled":
      return { end: "cancelled" };
    case "failed":
      return { end: "failed", reason: message.reason };
  }
}

/** From a bundle the worker is plain JavaScript beside it; from source a small program loads the TypeScript. */
function startWorker(workerData: WorkerData): Worker {
  const resourceLimits = { maxOldGenerationSizeMb: HEAP_MB };
  if (!import.meta.url.endsWith(".ts"))
    return new Worker(new URL("./worker.mjs", import.meta.url), { workerData, resourceLimits });
  const source = new URL("./worker.ts", import.meta.url).href;
  const program = `import("tsx/esm/api").then(({ register }) => { register(); return import(${JSON.stringify(source)}); });`;
  return new Worker(program, { eval: true, workerData, resourceLimits });
}
