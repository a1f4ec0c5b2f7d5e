import { Notice } from "#src/ui/notice.tsx";

/** What every person who works with the machine must have read; kept short, where the risk is. */
export function Cautions() {
  return (
    <Notice kind="caution" title="A lamp has no protection of its own">
      <ul className="list-outside list-['–_'] space-y-1 pl-[1.1em]">
        <li>
          A lamp on a fan output has no runaway protection. It must be switched by a device made for its current; on
          mains, zero-cross with slow time-proportional PWM, wired by a licensed electrician under the local electrical
          code.
        </li>
        <li>
          Never run an unattended heater without an independent over-temperature cut-out that does not depend on G-code.
          When a print is cancelled, halts or loses its connection, no further line runs, and none of ours can switch
          the lamp off.
        </li>
        <li>
          Radiant heaters, 400 °C nozzles and hot beds burn and can start fires. Lamps stay hot after they are off.
          Don't look into a lit lamp; fan ducts and fluoropolymer parts near it soften and fume.
        </li>
        <li>Fumes of overheated PEEK, PEKK and PPS need extraction. Leave speed and fan overrides at 100 %.</li>
        <li>
          Plans are estimates to be confirmed by trial, with the door closed, and never a certificate for a part. The
          machine maker's instructions and local codes come first.
        </li>
      </ul>
    </Notice>
  );
}
