import { type Column, columnText } from "#server/cli/table.ts";
import { counted } from "#server/cli/terminal.ts";
import type { Machine } from "#shared/formats/machine.ts";
import type { Polymer } from "#shared/formats/polymer.ts";
import type { Assumed, PredictedLayer, PredictionDocument } from "#shared/formats/prediction.ts";
import type { Profile } from "#shared/formats/profile.ts";
import type { Layer } from "#shared/layers/reading.ts";
import { drivenChannels } from "#shared/plan/driven-channels.ts";
import type { Plan } from "#shared/plan/plan.ts";

interface Predicted {
  name: string;
  layers: readonly Layer[];
  machine: Machine;
  profile: Profile;
  polymer: Polymer;
  plan: Plan;
  prediction: PredictionDocument;
}

/** Widest line of the table, in characters. */
const WIDTH = 120;

/** What `predict` shows people: a row for every layer, then what it rests on and what is not expected to work. */
export function predictionTable(subject: Predicted): string {
  const { name, machine, profile, polymer, prediction } = subject;
  const { calibration, assumed, advice, layers } = prediction;
  const fullName = polymer.variant === "" ? polymer.name : `${polymer.name} ${polymer.variant}`;
  const lines = [
    `${name === "-" ? "standard input" : name}: ${fullName} on machine ${machine.name}, profile ${profile.name}`,
    "",
    // The last line is for feet, which this table has not.
    ...columnText(columns(subject), layers.length).slice(0, -1),
    "",
    "temp.: of the layer just before the next one covers it; low and high are worst cases, all uncertain inputs at one",
    "end. contact: where it meets what lies below; ! does not weld. solid: time from the layer's begin, - where it is",
    "covered first. >Tg: time above Tg, cooling included. cryst.: absolute, after cooling. Duties and crystallinity are",
    "0–1. Behind the state, where the zone has a target: + reached over the whole band, ~ within it, - not.",
    calibration === "uncalibrated"
      ? "Uncalibrated: nothing was fitted to readings of this machine."
      : `Calibration: ${calibration}.`,
    ...(assumed.length === 0
      ? []
      : [
          `${counted(assumed.length, "input")} left out of the machine document, taken as typical:`,
          ...assumed.map(assumedText),
        ]),
    ...(advice.length === 0 ? [] : ["", "Advice", ...advice.map(({ message }) => `  ${message}`)]),
    "",
    "An estimate, to be confirmed by a trial print; never a certificate for a part.",
  ];
  return `${lines.join("\n")}\n`;
}

function columns({ layers, machine, profile, plan, prediction }: Predicted): Column[] {
  const predicted = prediction.layers;
  const column = (head: string, unit: string, cell: (layer: PredictedLayer) => string): Column => ({
    head: [head, unit],
    align: "right",
    cell: (row) => cell(predicted[row]),
  });
  const number = (value: number | null | undefined, decimals: number): string =>
    value === null || value === undefined ? "-" : value.toFixed(decimals);
  const fixed = [
    column("layer", "", ({ index }) => String(index)),
    { head: ["z", "mm"], align: "right", cell: (row) => layers[row].zMm.toFixed(2) },
    { head: ["time", "s"], align: "right", cell: (row) => layers[row].timeS.toFixed(1) },
  ] satisfies Column[];
  const results = [
    column("temp.", "°C", ({ interlayerC }) => number(interlayerC, 0)),
    column("low", "°C", ({ band }) => number(band?.interlayerC[0], 0)),
    column("high", "°C", ({ band }) => number(band?.interlayerC[1], 0)),
    column("contact", "°C", ({ contactC, verdicts }) => `${number(contactC, 0)}${verdicts.welds ? " " : "!"}`),
    column("solid", "s", ({ timeToSolidS }) => number(timeToSolidS, 1)),
    column(">Tg", "s", ({ timeAboveTgS }) => number(timeAboveTgS, 0)),
    column("cryst.", "", ({ crystallinity }) => number(crystallinity, 3)),
    column("low", "", ({ band }) => number(band?.crystallinity[0], 3)),
    column("high", "", ({ band }) => number(band?.crystallinity[1], 3)),
    { head: ["state", ""], align: "left", cell: (row) => stateText(predicted[row]) },
  ] satisfies Column[];
  const widthOf = (some: Column[]) =>
    columnText(some, predicted.length).reduce((most, { length }) => Math.max(most, length), 0);
  let room = WIDTH - widthOf([...fixed, ...results]);
  const duties: Column[] = [];
  for (const { id } of drivenChannels(machine, profile)) {
    const duty: Column = { head: [id, ""], align: "right", cell: (row) => number(plan.layers[row].duty[id], 2) };
    room -= widthOf([duty]) + 2;
    if (room >= 0) duties.push(duty);
  }
  return [...fixed, ...duties, ...results];
}

const REACHES = { yes: " +", "within the band": " ~", no: " -" } as const;

function stateText({ verdicts: { state, reaches } }: PredictedLayer): string {
  return `${state}${reaches === null ? "" : REACHES[reaches]}`;
}

function assumedText({ path, low, typical, high }: Assumed): string {
  const absorbed = path.endsWith(".fluxAtFullWM2") ? ", already absorbed" : "";
  return `  ${path} ${low === high ? typical : `${typical} (${low} to ${high})`}${absorbed}`;
}
