import type { Obstacle } from "#src/features/prediction/use-forecast.ts";
import { Notice, ProblemNotice } from "#src/ui/notice.tsx";

/** Why nothing is predicted. Without a prediction the plan and the file can still be made. */
export function ObstacleNotice({ obstacle }: { obstacle: Obstacle }) {
  if ("fault" in obstacle) {
    return (
      <Notice kind="caution" title="The prediction could not be computed">
        That is a fault of ours: {obstacle.fault}. The plan is not affected.
      </Notice>
    );
  }
  const { code, message, remedy, place } = obstacle.refusal;
  return (
    <ProblemNotice problem={{ status: 422, code, title: "This can't be predicted", detail: message, remedy, place }} />
  );
}
