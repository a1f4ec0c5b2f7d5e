import { expect, test } from "vitest";
import { ForecastClient, type ForecastWorker } from "#src/features/prediction/forecast-client.ts";
import type { Ask, Part, Reply, Request } from "#src/features/prediction/worker/messages.ts";

/** A worker that answers when the test says so. */
function fakeWorker() {
  const workers: (ForecastWorker & { asked: Request[]; ended: boolean })[] = [];
  const make = (): ForecastWorker => {
    const worker = {
      asked: [] as Request[],
      ended: false,
      onmessage: null,
      onerror: null,
      postMessage(request: Request) {
        worker.asked.push(request);
      },
      terminate() {
        worker.ended = true;
      },
    };
    workers.push(worker);
    return worker;
  };
  return { workers, make, answer: (reply: Reply, of = 0) => workers[of].onmessage?.({ data: reply }) };
}

const part = { layers: [], machine: {}, polymer: {} } as unknown as Part;
const forecast = (name: string) =>
  ({ kind: "forecast", profile: { name }, band: false }) as unknown as Extract<Ask, { kind: "forecast" }>;
const result = (tookMs: number) => ({ result: { tookMs } }) as unknown as Reply;
const nameOf = ({ ask }: Request) => (ask as unknown as { profile: { name: string } }).profile.name;

test("while one question is being answered only the latest waits, and those overtaken come back empty", async () => {
  const { workers, make, answer } = fakeWorker();
  const client = new ForecastClient(make);
  const answers = ["a", "b", "c", "d"].map((name) => client.ask<"forecast">(part, forecast(name)));
  expect(workers[0].asked.map(nameOf)).toEqual(["a"]);
  answer(result(1));
  expect(workers[0].asked.map(nameOf)).toEqual(["a", "d"]);
  answer(result(2));
  expect(await Promise.all(answers)).toEqual([result(1), undefined, undefined, result(2)]);
});

test("the part is handed over once, and again when it is another one or the worker is new", async () => {
  const { workers, make, answer } = fakeWorker();
  const client = new ForecastClient(make);
  const other = { ...part };
  for (const each of [part, part, other]) {
    const answered = client.ask<"forecast">(each, forecast("a"));
    answer(result(1));
    await answered;
  }
  expect(workers[0].asked.map((request) => request.part)).toEqual([part, undefined, other]);
});

test("a forecast goes before questions about layers, since they rest on it", () => {
  const { workers, make, answer } = fakeWorker();
  const client = new ForecastClient(make);
  void client.ask<"forecast">(part, forecast("a"));
  void client.ask<"balance">(part, { kind: "balance", position: 3 });
  void client.ask<"forecast">(part, forecast("b"));
  answer(result(1));
  answer(result(1));
  expect(workers[0].asked.map(({ ask }) => ask.kind)).toEqual(["forecast", "forecast", "balance"]);
});

test("a worker that dies answers with a fault, and the next question gets a new one", async () => {
  const { workers, make, answer } = fakeWorker();
  const client = new ForecastClient(make);
  const lost = client.ask<"forecast">(part, forecast("a"));
  workers[0].onerror?.({ message: "out of memory" });
  expect(await lost).toEqual({ fault: "out of memory" });
  const again = client.ask<"forecast">(part, forecast("b"));
  expect(workers).toHaveLength(2);
  expect(workers[1].asked[0].part).toBe(part);
  answer(result(1), 1);
  expect(await again).toEqual(result(1));
});

test("closing ends the worker and lets nobody wait", async () => {
  const { workers, make } = fakeWorker();
  const client = new ForecastClient(make);
  const answers = [client.ask<"forecast">(part, forecast("a")), client.ask<"forecast">(part, forecast("b"))];
  client.close();
  expect(await Promise.all(answers)).toEqual([undefined, undefined]);
  expect(workers[0].ended).toBe(true);
});
