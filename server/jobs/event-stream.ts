import type { Response } from "express";
import type { Job } from "#shared/contract/jobs.ts";

/** A line often enough that no proxy in between takes the stream for dead. */
const HEARTBEAT_MS = 15_000;
/** A stream ends after this time; the browser opens the next one by itself, and whether it may is looked at again. */
const LONGEST_MS = 15 * 60_000;
const RECONNECT_MS = 2_000;
/** A client that is this far behind is cut off; it comes back and asks for what it missed. */
const MOST_BUFFERED_BYTES = 1 << 20;

/** Server-sent events to one client. */
export class EventStream {
  private readonly response: Response;

  constructor(response: Response) {
    this.response = response;
    response.status(200).set({
      "Content-Type": "text/event-stream; charset=utf-8",
      "Cache-Control": "no-store",
      // Proxies would hold events back until there are many.
      "X-Accel-Buffering": "no",
    });
    response.write(`retry: ${RECONNECT_MS}\n\n`);
  }

  job(job: Job): void {
    if (this.response.writableLength > MOST_BUFFERED_BYTES) {
      this.response.destroy();
      return;
    }
    this.response.write(`id: ${Date.now()}\nevent: job\ndata: ${JSON.stringify(job)}\n\n`);
  }

  /** Lasts until the client leaves, the server stops or the stream is old. */
  async last(closing: AbortSignal): Promise<void> {
    const { response } = this;
    const heartbeat = setInterval(() => response.write(":\n\n"), HEARTBEAT_MS);
    const old = setTimeout(() => response.end(), LONGEST_MS);
    const end = (): void => void response.end();
    closing.addEventListener("abort", end);
    if (closing.aborted) end();
    try {
      await new Promise<void>((resolve) => (response.closed ? resolve() : response.once("close", resolve)));
    } finally {
      clearInterval(heartbeat);
      clearTimeout(old);
      closing.removeEventListener("abort", end);
    }
  }
}
