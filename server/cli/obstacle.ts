import { errorCode, Obstacle } from "#server/cli/exit.ts";

const REASONS: Record<string, string> = {
  ENOSPC: "the disk is full",
  EDQUOT: "your share of the disk is used up",
  EFBIG: "the file would be larger than is allowed here",
  EACCES: "you may not write there",
  EPERM: "you may not write there",
  EROFS: "the disk can't be written",
  EIO: "the disk fails",
};

/**
 * What stands in the way in place of a system's error about a file that is written; anything else is returned as it is.
 *
 * @param folder where it was to be written
 */
export function obstacle(error: unknown, folder: string, remedy: string): unknown {
  const reason = REASONS[errorCode(error) ?? ""];
  return reason === undefined ? error : new Obstacle(`nothing can be written in ${folder}: ${reason}`, remedy);
}
