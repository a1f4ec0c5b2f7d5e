import { chooseSheet, type SheetChoice, useSheetChoice } from "#src/lib/sheet.ts";

const CHOICES: { value: SheetChoice; name: string }[] = [
  { value: "light", name: "Light" },
  { value: "dark", name: "Dark" },
  { value: "system", name: "As the system" },
];

/** Light or dark sheet, or what the system says. Remembered in this browser. */
export function SheetSwitch() {
  const choice = useSheetChoice();
  return (
    <label className="flex items-center gap-2 text-small">
      <span className="text-soft">Sheet</span>
      <select
        value={choice}
        onChange={(event) => chooseSheet(event.target.value as SheetChoice)}
        className="min-h-8 rounded border border-hair bg-paper px-1 text-ink hover:border-ink"
      >
        {CHOICES.map(({ value, name }) => (
          <option key={value} value={value}>
            {name}
          </option>
        ))}
      </select>
    </label>
  );
}
