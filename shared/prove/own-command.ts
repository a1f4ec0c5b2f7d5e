import type { Drive } from "#shared/formats/machine.ts";

/**
 * The duty that a command of ours sets on an output, or undefined when it is not the one form in which that output's
 * duty is written: no other word, no other spelling, no finer value than the output resolves.
 *
 * | output | form |
 * | --- | --- |
 * | fan index, pin | `M106 [P…] S…`, `M42 P… S…`; no P for fan 0; S 0–255, or 0.0–1.0 where full power is 1 |
 * | named fan, pin | `SET_FAN_SPEED FAN=… SPEED=…`, `SET_PIN PIN=… VALUE=…`; at most three decimals |
 */
export function ownDuty(code: string, drive: Drive): number | undefined {
  switch (drive.by) {
    case "fan-index":
      return registerDuty(after(code, drive.index === 0 ? "M106 S" : `M106 P${drive.index} S`), drive.fullScale);
    case "pin":
      return registerDuty(after(code, `M42 P${drive.pin} S`), drive.fullScale);
    case "named-fan":
      return decimalDuty(after(code, `SET_FAN_SPEED FAN=${drive.name} SPEED=`), 1);
    case "named-pin":
      return decimalDuty(after(code, `SET_PIN PIN=${drive.name} VALUE=`), drive.fullScale);
  }
}

function after(code: string, lead: string): string | undefined {
  return code.startsWith(lead) ? code.slice(lead.length) : undefined;
}

function registerDuty(value: string | undefined, fullScale: 255 | 1): number | undefined {
  if (value === undefined) return undefined;
  if (fullScale === 255)
    return /^(0|[1-9]\d{0,2})$/.test(value) && Number(value) <= 255 ? Number(value) / 255 : undefined;
  // A value without a decimal point would be read on the other scale by some firmware.
  return /^(0\.(0|\d{0,2}[1-9])|1\.0)$/.test(value) ? Number(value) : undefined;
}

/** Thousandths of full power; a full scale above 1 multiplies them. */
function decimalDuty(value: string | undefined, fullScale: number): number | undefined {
  if (value === undefined || !/^(0|[1-9]\d*)(\.\d{0,2}[1-9])?$/.test(value)) return undefined;
  const thousandths = Math.round(Number(value) * 1000);
  const step = thousandths / fullScale;
  return Number.isInteger(step) && step <= 1000 ? step / 1000 : undefined;
}
