import type { ReactNode } from "react";
import type { VersionHead } from "#shared/contract/documents.ts";
import { moment } from "#src/lib/format.ts";

interface Props {
  head: VersionHead;
  /** profiles are approved for parts that ship */
  withApproval: boolean;
  /** what can be done with it */
  children?: ReactNode;
}

/** Who made a version, when and why, and whether it may be used for parts that ship. */
export function VersionFacts({ head, withApproval, children }: Props) {
  const { number, createdAt, createdBy, note, approvedAt, approvedBy } = head;
  return (
    <div className="border-l border-rule pl-4">
      <h3 className="font-semibold">Version {number}</h3>
      <p>
        By {createdBy}, <span className="font-mono text-small whitespace-nowrap">{moment(createdAt)}</span>
      </p>
      <p className="whitespace-pre-line wrap-anywhere">{note ?? <span className="text-soft">No reason given.</span>}</p>
      {withApproval && (
        <p>
          {approvedAt ? (
            <>
              Approved by {approvedBy},{" "}
              <span className="font-mono text-small whitespace-nowrap">{moment(approvedAt)}</span>
            </>
          ) : (
            "Not approved: for trials only."
          )}
        </p>
      )}
      {children && <div className="mt-2">{children}</div>}
    </div>
  );
}
