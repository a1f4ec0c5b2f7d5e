import { Forecaster } from "#src/features/prediction/worker/forecaster.ts";
import type { Request } from "#src/features/prediction/worker/messages.ts";

const forecaster = new Forecaster();

self.addEventListener("message", ({ data }: MessageEvent<Request>) => {
  self.postMessage(forecaster.answer(data));
});
