import { readlinkSync } from "node:fs";
import { setPriority } from "node:os";
import { parentPort, workerData } from "node:worker_threads";
import type { JobContext } from "#server/jobs/job-context.ts";
import { readJob } from "#server/jobs/read-job.ts";
import type { FromWorker, Task, TaskProgress, TaskResult, ToWorker, WorkerData } from "#server/jobs/tasks.ts";
import { tuneJob } from "#server/jobs/tune-job.ts";
import { warmUp } from "#server/jobs/warm-up.ts";
import { LocalStorage } from "#server/storage/local-storage.ts";
import { Refusal } from "#shared/refusal.ts";

/** Niceness of this thread: requests go before jobs where both want a processor. */
const NICENESS = 5;
/** Progress is told at most this often. */
const TELL_EVERY_MS = 100;

const { storageRoot } = workerData as WorkerData;
const storage = LocalStorage.share(storageRoot);
const port = parentPort!;
const say = (message: FromWorker): void => port.postMessage(message);
let running: AbortController | undefined;

port.on("message", (message: ToWorker) => {
  if (message.say === "cancel") running?.abort();
  else void run(message.job, message.task);
});
standBack();
warmUp();
say({ say: "ready" });

/** On Linux every thread has a priority of its own; elsewhere this thread stays like the others. */
function standBack(): void {
  try {
    const [, , threadId] = readlinkSync("/proc/thread-self").split("/");
    setPriority(Number(threadId), NICENESS);
  } catch {
    // There is no such file, or it is not allowed.
  }
}

/** One job at a time; the server sends the next one only after this one's last word. */
async function run(job: string, task: Task): Promise<void> {
  running = new AbortController();
  const { signal } = running;
  try {
    const result = await work(task, { storage, owner: job, signal, progress: throttled() });
    say({ say: "done", result });
  } catch (error) {
    await storage.discardOf(job).catch(() => {});
    say(lastWord(error, signal));
  } finally {
    running = undefined;
  }
}

const work = (task: Task, context: JobContext): Promise<TaskResult> =>
  task.kind === "read" ? readJob(task, context) : tuneJob(task, context);

function lastWord(error: unknown, signal: AbortSignal): FromWorker {
  if (signal.aborted) return { say: "cancelled" };
  if (error instanceof Refusal) {
    const { code, message, remedy, place } = error;
    return { say: "refused", refusal: { code, message, remedy, place } };
  }
  return { say: "failed", reason: error instanceof Error ? (error.stack ?? error.message) : String(error) };
}

function throttled(): (progress: TaskProgress) => void {
  let next = 0;
  return (progress) => {
    const now = performance.now();
    if (now < next) return;
    next = now + TELL_EVERY_MS;
    say({ say: "progress", progress });
  };
}
