import type { ForecastWorker } from "#src/features/prediction/forecast-client.ts";
import PredictionWorker from "#src/features/prediction/worker/prediction-worker.ts?worker";

export const startWorker = (): ForecastWorker => new PredictionWorker();
