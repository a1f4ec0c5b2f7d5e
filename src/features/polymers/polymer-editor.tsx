import { useState } from "react";
import { Confidence, type Polymer, type Sourced } from "#shared/formats/polymer.ts";
import { type CardField, filledGroups, withSourced } from "#src/features/polymers/card-fields.ts";
import { crystallising, solidByCrystals } from "#src/features/polymers/polymer-edits.ts";
import { CheckField, TextField } from "#src/ui/field.tsx";
import { Section } from "#src/ui/section.tsx";

interface Props {
  polymer: Polymer;
  onChange(polymer: Polymer): void;
}

/** Every number of a card with its source; a number that changes should say where the new one comes from. */
export function PolymerEditor({ polymer, onChange }: Props) {
  return (
    <>
      <Section title="Name">
        <div className="grid gap-4 md:grid-cols-2">
          <TextField
            label="Polymer"
            value={polymer.name}
            onChange={({ target }) => onChange({ ...polymer, name: target.value })}
          />
          <TextField
            label="Variant"
            hint="Grade, filler or colour; empty for the neat polymer."
            value={polymer.variant}
            onChange={({ target }) => onChange({ ...polymer, variant: target.value })}
          />
        </div>
        <CheckField
          className="mt-3"
          label="Amorphous is within reach when it is printed"
          checked={polymer.amorphousReachable}
          disabled={polymer.crystallinity === null}
          onChange={({ target }) => onChange({ ...polymer, amorphousReachable: target.checked })}
        />
        <CheckField
          label="It crystallises: it has a melting temperature and a rate at which crystals grow"
          checked={polymer.crystallinity !== null}
          onChange={({ target }) => onChange(crystallising(polymer, target.checked))}
        />
        {polymer.crystallinity !== null && (
          <CheckField
            label="Crystals alone hold a layer's shape, from some crystallinity on"
            checked={polymer.solidAtRelativeCrystallinity !== undefined}
            onChange={({ target }) => onChange(solidByCrystals(polymer, target.checked))}
          />
        )}
      </Section>
      {filledGroups(polymer).map(({ title, note, fields }) => (
        <Section key={title} title={title} note={note}>
          <div className="flex flex-col">
            {fields.map(({ field, sourced }) => (
              <NumberRow
                key={field.label}
                field={field}
                sourced={sourced}
                onChange={(changed) => onChange(withSourced(polymer, field.path, changed))}
              />
            ))}
          </div>
        </Section>
      ))}
    </>
  );
}

const BOX = "min-h-9 rounded border border-rule bg-sheet px-2 hover:border-ink";

interface RowProps {
  field: CardField;
  sourced: Sourced;
  onChange(sourced: Sourced): void;
}

function NumberRow({ field: { label, unit }, sourced, onChange }: RowProps) {
  // What is typed is kept as typed: "0." is on its way to a number.
  const [text, setText] = useState(String(sourced.value));
  const shown = Number(text) === sourced.value ? text : String(sourced.value);
  return (
    <fieldset className="grid grid-cols-[14rem_11rem_10rem_minmax(8rem,1fr)] items-baseline gap-x-3 border-b border-hair py-1.5 max-lg:grid-cols-2 max-lg:gap-y-1">
      <legend className="sr-only">{label}</legend>
      <span aria-hidden>{label}</span>
      <span className="flex items-baseline gap-2">
        <input
          aria-label={`${label}, value${unit && ` in ${unit}`}`}
          className={`${BOX} w-24 text-right font-mono`}
          inputMode="decimal"
          value={shown}
          onChange={({ target }) => {
            setText(target.value);
            const value = Number(target.value.replace(",", "."));
            if (target.value.trim() !== "" && Number.isFinite(value)) onChange({ ...sourced, value });
          }}
          onBlur={() => setText(String(sourced.value))}
        />
        <span className="font-mono text-small whitespace-nowrap text-soft">{unit}</span>
      </span>
      <select
        aria-label={`${label}, confidence`}
        className={BOX}
        value={sourced.confidence}
        onChange={({ target }) => onChange({ ...sourced, confidence: Confidence.parse(target.value) })}
      >
        {Confidence.options.map((each) => (
          <option key={each}>{each}</option>
        ))}
      </select>
      <textarea
        aria-label={`${label}, source`}
        rows={1}
        className={`${BOX} field-sizing-content w-full resize-none py-1.5`}
        value={sourced.source}
        onChange={({ target }) => onChange({ ...sourced, source: target.value })}
      />
    </fieldset>
  );
}
