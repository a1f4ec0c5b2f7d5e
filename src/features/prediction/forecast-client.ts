import type { Ask, Part, Reply, Request, Results } from "#src/features/prediction/worker/messages.ts";

type Handler<Event> = { bivarianceHack(event: Event): void }["bivarianceHack"];

/** As much of a Worker as is needed here. */
export interface ForecastWorker {
  postMessage(request: Request): void;
  terminate(): void;
  // Methods, so that a Worker, whose handlers take whole events, fits.
  onmessage: Handler<{ data: Reply }> | null;
  onerror: Handler<{ message?: string }> | null;
}

/** What one asks for comes back, or was overtaken by a later question of its kind. */
export type Answer<Kind extends keyof Results> =
  | { result: Results[Kind] }
  | Exclude<Reply, { result: unknown }>
  | undefined;

interface Waiting {
  part: Part;
  ask: Ask;
  done(reply: Reply | undefined): void;
}

/** Where several wait, the forecast is what the others rest on. */
const ORDER: Ask["kind"][] = ["forecast", "balance", "levers"];

/**
 * Puts questions to a worker, one at a time. While one is being answered, only the latest of each kind waits: a curve
 * point that is dragged costs no more forecasts than can be made meanwhile.
 */
export class ForecastClient {
  private readonly waiting = new Map<Ask["kind"], Waiting>();
  private running: Waiting | undefined;
  private worker: ForecastWorker | undefined;
  private given: Part | undefined;
  private readonly makeWorker: () => ForecastWorker;

  constructor(makeWorker: () => ForecastWorker) {
    this.makeWorker = makeWorker;
  }

  ask<Kind extends Ask["kind"]>(part: Part, ask: Extract<Ask, { kind: Kind }>): Promise<Answer<Kind>> {
    return new Promise((resolve) => {
      this.waiting.get(ask.kind)?.done(undefined);
      this.waiting.set(ask.kind, { part, ask, done: (reply) => resolve(reply as Answer<Kind>) });
      this.next();
    });
  }

  /** Ends the worker; whatever was asked counts as overtaken. */
  close(): void {
    this.drop();
    for (const { done } of this.waiting.values()) done(undefined);
    this.waiting.clear();
    this.running?.done(undefined);
    this.running = undefined;
  }

  private next(): void {
    if (this.running) return;
    const kind = ORDER.find((each) => this.waiting.has(each));
    const next = kind && this.waiting.get(kind);
    if (!kind || !next) return;
    this.waiting.delete(kind);
    this.running = next;
    const { part, ask } = next;
    const worker = this.ready();
    worker.postMessage(part === this.given ? { ask } : { part, ask });
    this.given = part;
  }

  private ready(): ForecastWorker {
    if (this.worker) return this.worker;
    const worker = this.makeWorker();
    worker.onmessage = ({ data }) => this.finish(data);
    worker.onerror = ({ message }) => {
      // A worker whose code could not be fetched, or that ran out of memory: the next question gets a new one.
      this.drop();
      this.finish({ fault: message || "the prediction's worker has stopped" });
    };
    this.worker = worker;
    return worker;
  }

  private finish(reply: Reply): void {
    const { running } = this;
    this.running = undefined;
    running?.done(reply);
    this.next();
  }

  private drop(): void {
    this.worker?.terminate();
    this.worker = undefined;
    this.given = undefined;
  }
}
