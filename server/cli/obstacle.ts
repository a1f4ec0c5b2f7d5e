import { errorCode, Obstacle } from "#server/cli/exit.ts";

const REASONS: Record<string, string> = {
  ENOSPC: "the disk is full",
  EDQUOT: "your share of the disk is used up",
  EFBIG: "the file would be larger than is allowed here",
  EACCES: "you may not write there",
  EPERM: "you may not write there",
  EROFS: "the disk can't be written",
  EIO: "the disk fails",
  ENOENT: "the folder is gone",
};

/**
 * What stands in the way in place of a system's error about a file that is written; anything else is returned as it is.
 *
 * @param where what was to be written, and where: `in /parts`, `to standard output`
 */
export function obstacle(error: unknown, where: string, remedy: string): unknown {
  const reason = REASONS[errorCode(error) ?? ""];
  return reason === undefined ? error : new Obstacle(`nothing can be written ${where}: ${reason}`, remedy);
}
