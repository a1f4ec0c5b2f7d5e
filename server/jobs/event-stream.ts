import type { Response } from "express";
import type { Job } from "#shared/contract/jobs.ts";

/**
 * Whether the client may still listen is looked at this often, and a line is written, so that no proxy in between takes
 * the stream for dead.
 */
const LOOK_EVERY_MS = 10_000;
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

  /** Lasts until the client leaves, may listen no longer, or the server stops. */
  async last(closing: AbortSignal, mayListen: () => Promise<boolean>): Promise<void> {
    const { response } = this;
    const end = (): void => void response.end();
    const look = async (): Promise<void> => {
      if (await mayListen()) response.write(":\n\n");
      else end();
    };
    const looking = setInterval(() => void look().catch(end), LOOK_EVERY_MS);
    closing.addEventListener("abort", end);
    if (closing.aborted) end();
    try {
      await new Promise<void>((resolve) => (response.closed ? resolve() : response.once("close", resolve)));
    } finally {
      clearInterval(looking);
      closing.removeEventListener("abort", end);
    }
  }
}
