/** One thing to be sure of before the first download for a machine. */
export interface SafetyItem {
  /** what is stored when it is ticked; never given to another item */
  id: string;
  text: string;
}

/**
 * What each person ticks, once for every version of a machine. The first six are events after which no further line of
 * the file runs, so no line of ours can switch the lamp off.
 */
export const SAFETY_CHECKLIST: readonly SafetyItem[] = [
  { id: "off-on-cancel", text: "I know what switches the lamp off when the print is cancelled." },
  { id: "off-on-runout", text: "I know what switches the lamp off when the filament runs out." },
  { id: "off-on-host-pause", text: "I know what switches the lamp off when the host pauses the print." },
  { id: "off-on-lost-connection", text: "I know what switches the lamp off when the connection is lost." },
  { id: "off-on-halt", text: "I know what switches the lamp off when the firmware halts." },
  { id: "off-on-power-return", text: "I know that the lamp stays off when power returns after an outage." },
  {
    id: "cut-out",
    text: "The lamp has an independent over-temperature cut-out that does not depend on G-code, and is never left unattended without it.",
  },
  {
    id: "switching-device",
    text: "The lamp is switched by a device made for its current; on mains, zero-cross with slow time-proportional PWM, wired by a licensed electrician under the local electrical code.",
  },
  {
    id: "hot-parts",
    text: "Nobody looks into a lit lamp, lamp, nozzle and bed are kept out of reach while hot, and fan ducts and fluoropolymer parts near the lamp can take its heat.",
  },
  { id: "extraction", text: "Fumes of overheated polymer are extracted." },
  { id: "overrides", text: "Speed and fan overrides stay at 100 % while the tuned file runs." },
  {
    id: "estimate",
    text: "The plan is an estimate to be confirmed by trial, with the door closed; the machine maker's instructions and local codes come first.",
  },
];

/** Items of the checklist that are not ticked. */
export function missingItems(ticked: readonly string[]): SafetyItem[] {
  return SAFETY_CHECKLIST.filter(({ id }) => !ticked.includes(id));
}
