import type { ReactNode } from "react";
import { ProblemNotice } from "#src/ui/notice.tsx";

interface Props {
  title: string;
  refusal?: { code: string; message: string; remedy: string; place: { line?: number; layer?: number; path?: string } };
  actions?: ReactNode;
}

/** How work on a file ended without a result. */
export function RefusalNotice({ title, refusal, actions }: Props) {
  const { code, message, remedy, place } = refusal ?? {
    code: "own-fault",
    message: "That is a fault of ours, not of the file.",
    remedy: "Try again. If it stays, tell whoever runs the server.",
    place: {},
  };
  return <ProblemNotice problem={{ status: 422, code, title, detail: message, remedy, place }} actions={actions} />;
}
