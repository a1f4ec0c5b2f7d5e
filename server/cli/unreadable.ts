import { errorCode } from "#server/cli/exit.ts";
import { Refusal } from "#shared/refusal.ts";

/** What the system's codes mean, and what to do about it. */
const REASONS: Record<string, [code: string, what: string, remedy: string]> = {
  ENOENT: ["not-found", "there is no such file", "Check the name and the folder it is in."],
  ENOTDIR: ["not-found", "a part of the path is not a folder", "Check the name and the folder it is in."],
  ENAMETOOLONG: ["not-found", "the name is too long", "Check the name and the folder it is in."],
  ELOOP: ["not-found", "the path runs in a circle of links", "Give the name of the file itself."],
  EISDIR: ["not-a-file", "this is a folder", "Give the name of a file."],
  EACCES: ["not-readable", "you may not read this file", "Have its permissions changed, or copy it."],
  EPERM: ["not-readable", "you may not read this file", "Have its permissions changed, or copy it."],
  EIO: ["not-readable", "the disk can't read this file", "Copy it from its source again."],
};

/**
 * A refusal in place of a system's error about a file that is read; anything else is returned as it is.
 *
 * @param what how the message calls the file, e.g. `the profile document`
 */
export function unreadable(error: unknown, what: string): unknown {
  const reason = REASONS[errorCode(error) ?? ""];
  if (reason === undefined) return error;
  const [code, why, remedy] = reason;
  return new Refusal(code, `${what} can't be read: ${why}`, remedy);
}
