import { COMMANDS, type Command } from "#server/cli/arguments.ts";

const CALL = "npm run -s quenchline --";

const USAGES: Record<Command, string> = {
  read: "read FILE --machine M.json [--json]",
  tune: `tune FILE --machine M.json --profile P.json (--out OUT | --in-place)
           [--polymer Q.json] [--plan PLAN.json] [--proof PROOF.json]`,
  predict: "predict FILE --machine M.json --profile P.json [--polymer Q.json] [--json]",
  prove: "prove ORIGINAL TUNED --machine M.json [--profile P.json] [--polymer Q.json] [--json]",
};

const SUMMARIES: Record<Command, string> = {
  read: "measure a toolpath: one row per layer",
  tune: "write a tuned toolpath: its fan and heater lines come from a profile",
  predict: "foresee temperature and crystallinity, layer by layer",
  prove: "compare a tuned toolpath with its original",
};

const FILE = "FILE is sliced G-code, plain or gzip; - reads standard input.";

const EXIT_STATUS = `Exit status
  0  done
  1  a fault of ours, or the disk's: full, not writable
  2  called wrongly
  3  input refused: what is wrong, where and what to do is on standard error`;

const DETAILS: Record<Command, string> = {
  read: `Reads a toolpath and lists its layers: height, print time with acceleration and look-ahead, lengths, volume, the
duties of fans and heaters it came with, waits, and below them what looks odd. Nothing is written.

Example
  ${CALL} read samples/seal-ring.gcode --machine samples/machines/tern.json

${FILE}

Options
  --machine M.json   the machine: limits of its motion, the outputs of its fans and heaters
  --json             one quenchline.reading/1 document on standard output and nothing else;
                     where the input is refused, a quenchline.refusal/1 object

${EXIT_STATUS}`,
  tune: `Plans the duty of every fan and heater that the profile drives, layer by layer, and writes the toolpath with these
commands in place of its own. Every other byte stays. The new file is read back and compared with the original; only
if that proof passes does it appear as OUT, complete or not at all.

Example
  ${CALL} tune samples/seal-ring.gcode --machine samples/machines/tern.json \\
    --profile samples/profiles/seal-ring-stiff-base-and-tough-lip.json --out seal-ring.tuned.gcode

${FILE} Where OUT ends in .gz it is packed.

Options
  --machine M.json    the machine: limits of its motion, the outputs of its fans and heaters
  --profile P.json    the profile: zones by height, cooling and heating rules, limits
  --out OUT           the tuned toolpath; its folder must be there
  --in-place          put the tuned toolpath in FILE's place instead (the form for a slicer's post-processing hook)
  --polymer Q.json    the polymer's card: checks that the profile was written for it. A profile that holds layers on a
                      state is solved with it; without it with the card of that name that comes with Quenchline
  --plan PLAN.json    also write the plan: every duty with its reasons
  --proof PROOF.json  also write the proof; it is written when the proof fails, too

${EXIT_STATUS}
  4  the proof failed: the checks that failed are on standard error, OUT was not written`,
  predict: `Plans the duties as tune does and foresees what they make of every layer: its temperature when the next one covers
it, whether it is solid by then and welds, and its crystallinity once all is cold, each with a worst-case band. An
estimate, to be confirmed by a trial print. Nothing is written.

Example
  ${CALL} predict samples/seal-ring.gcode --machine samples/machines/tern.json \\
    --profile samples/profiles/seal-ring-stiff-base-and-tough-lip.json --polymer samples/polymers/peek.json

${FILE}

Options
  --machine M.json   the machine, and what surrounds the part; what its document leaves out is taken as typical
  --profile P.json   the profile: zones by height with their targets, cooling and heating rules, limits
  --polymer Q.json   the polymer's card; without it the card of that name that comes with Quenchline, which is told
  --json             one quenchline.prediction/1 document on standard output and nothing else;
                     where the input is refused, a quenchline.refusal/1 object

${EXIT_STATUS}`,
  prove: `Compares a tuned toolpath with its original: every byte outside Quenchline's own lines is the same, the duties keep
to the limits, the heater is off at the end, motion and print time have not changed.

Example
  ${CALL} prove samples/seal-ring.gcode seal-ring.tuned.gcode --machine samples/machines/tern.json

ORIGINAL and TUNED are G-code, plain or gzip; one of them may be - for standard input.

Options
  --machine M.json   the machine both files are for
  --profile P.json   the profile whose limits TUNED has to keep; without it the machine's alone are checked
  --polymer Q.json   the card that the duties of a profile that holds were solved with; without it such a TUNED is held
                     against the limits, but not against the plan
  --json             one quenchline.proof/1 document on standard output and nothing else;
                     where the input is refused, a quenchline.refusal/1 object

${EXIT_STATUS}
  4  the proof failed: the checks that failed are listed`,
};

const OVERVIEW = `Quenchline reads a sliced toolpath, measures how long every layer takes, and rewrites its fan and heater
commands so that each layer freezes in shape and lands on the chosen side of the glass transition.

Usage
  ${CALL} COMMAND …

Commands
${COMMANDS.map((name) => `  ${name.padEnd(8)} ${SUMMARIES[name]}`).join("\n")}

To begin with
  ${CALL} read samples/seal-ring.gcode --machine samples/machines/tern.json

More about one command
  ${CALL} COMMAND --help

The folder samples/ holds toolpaths, machines and profiles to try. Paths are taken from where you call. Progress is
shown on standard error, only on a terminal.

${EXIT_STATUS}
  4  proof failed
`;

/** What `--help` prints, for one command or as an overview. */
export function help(command?: Command): string {
  if (command === undefined) return OVERVIEW;
  return `Usage\n  ${CALL} ${USAGES[command]}\n\n${DETAILS[command]}\n`;
}

/** The few lines that follow the message about a wrong call. */
export function usage(command?: string): string {
  const known = COMMANDS.find((name) => name === command);
  const lines = known ? [USAGES[known]] : COMMANDS.map((name) => USAGES[name]);
  return `usage: ${CALL} ${lines.join(`\n       ${CALL} `)}\n--help${known ? ` after ${known}` : ""} tells more.\n`;
}
