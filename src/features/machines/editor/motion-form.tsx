import type { Motion } from "#shared/formats/machine.ts";
import { CorneringFields } from "#src/features/machines/editor/cornering-fields.tsx";
import type { MachineEditing } from "#src/features/machines/editor/machine-editing.ts";
import { withAxisLimit, withMotion } from "#src/features/machines/editor/machine-edits.ts";
import { choiceText, named, wordsOf } from "#src/lib/document-words.ts";
import { CheckField, SelectField } from "#src/ui/field.tsx";
import { NumberField } from "#src/ui/number-field.tsx";

const GRID = "grid grid-cols-2 gap-3 md:grid-cols-3 xl:grid-cols-4";

/** What layer times are computed from. */
export function MotionForm({ editing }: { editing: MachineEditing }) {
  const { machine, problems, edit } = editing;
  const { motion } = machine;
  const set = (changes: Partial<Motion>, field: string) => edit(withMotion(machine, changes), `motion.${field}`);
  const number = (field: "maxSpeedMmS" | "initialSpeedMmS" | "arcSegmentMm" | "filamentDiameterMm", step: number) => (
    <NumberField
      {...named(`motion.${field}`)}
      step={step}
      value={motion[field]}
      problem={problems.at(`motion.${field}`)}
      onChange={(value) => set({ [field]: value }, field)}
    />
  );
  return (
    <div className="flex flex-col gap-5">
      <div className={GRID}>
        {number("maxSpeedMmS", 5)}
        {(["print", "travel", "retract"] as const).map((kind) => (
          <NumberField
            key={kind}
            {...named(`motion.accelMmS2.${kind}`)}
            step={50}
            value={motion.accelMmS2[kind]}
            problem={problems.at(`motion.accelMmS2.${kind}`)}
            onChange={(value) => set({ accelMmS2: { ...motion.accelMmS2, [kind]: value } }, `accelMmS2.${kind}`)}
          />
        ))}
      </div>
      <CorneringFields editing={editing} />
      <AxisFields editing={editing} />
      <div className={GRID}>
        <SelectField
          label={wordsOf("motion.extruderLimits")}
          value={motion.extruderLimits}
          onChange={({ target }) => set({ extruderLimits: target.value as Motion["extruderLimits"] }, "extruderLimits")}
        >
          <option value="extrude-only">{choiceText("extrude-only")}</option>
          <option value="every-move">{choiceText("every-move")}</option>
        </SelectField>
        <LookAheadFields editing={editing} />
        <SelectField
          label={wordsOf("motion.dwellP")}
          value={motion.dwellP}
          onChange={({ target }) => set({ dwellP: target.value as Motion["dwellP"] }, "dwellP")}
        >
          <option value="ms">ms</option>
          <option value="s">s</option>
        </SelectField>
        {number("initialSpeedMmS", 1)}
        {number("arcSegmentMm", 0.1)}
        {number("filamentDiameterMm", 0.05)}
        {(["lengthMm", "speedMmS"] as const).map((field) => (
          <NumberField
            key={field}
            {...named(`motion.firmwareRetract.${field}`)}
            step={field === "lengthMm" ? 0.1 : 1}
            value={motion.firmwareRetract[field]}
            problem={problems.at(`motion.firmwareRetract.${field}`)}
            onChange={(value) =>
              set({ firmwareRetract: { ...motion.firmwareRetract, [field]: value } }, `firmwareRetract.${field}`)
            }
          />
        ))}
      </div>
      <div>
        <CheckField
          label={wordsOf("motion.stopAtExtrudeOnly")}
          checked={motion.stopAtExtrudeOnly}
          onChange={({ target }) => set({ stopAtExtrudeOnly: target.checked }, "stopAtExtrudeOnly")}
        />
        <CheckField
          label={wordsOf("motion.honourFileLimits")}
          checked={motion.honourFileLimits}
          onChange={({ target }) => set({ honourFileLimits: target.checked }, "honourFileLimits")}
        />
        <CheckField
          label={wordsOf("motion.axisModeSetsExtruder")}
          checked={motion.axisModeSetsExtruder}
          onChange={({ target }) => set({ axisModeSetsExtruder: target.checked }, "axisModeSetsExtruder")}
        />
      </div>
    </div>
  );
}

/** Limits of single axes, a row each; an empty one is no limit. */
function AxisFields({ editing }: { editing: MachineEditing }) {
  const { machine, problems, edit } = editing;
  return (
    <div className={GRID}>
      {(["x", "y", "z", "e"] as const).flatMap((axis) =>
        (["maxSpeedMmS", "maxAccelMmS2"] as const).map((field) => (
          <NumberField
            key={axis + field}
            {...named(`motion.axes.${axis}.${field}`)}
            hint="empty: no limit"
            step={field === "maxSpeedMmS" ? 1 : 50}
            value={machine.motion.axes[axis]?.[field]}
            problem={problems.at(`motion.axes.${axis}.${field}`)}
            onChange={(value) => edit(withAxisLimit(machine, axis, field, value), `motion.axes.${axis}.${field}`)}
          />
        )),
      )}
    </div>
  );
}

function LookAheadFields({ editing }: { editing: MachineEditing }) {
  const { machine, problems, edit } = editing;
  const { lookAhead } = machine.motion;
  const whole = lookAhead === "full";
  return (
    <>
      <SelectField
        label={wordsOf("motion.lookAhead")}
        value={whole ? "full" : "blocks"}
        onChange={({ target }) => edit(withMotion(machine, { lookAhead: target.value === "full" ? "full" : 16 }))}
      >
        <option value="full">{choiceText("full")}</option>
        <option value="blocks">a number of blocks</option>
      </SelectField>
      {!whole && (
        <NumberField
          label="Blocks"
          step={1}
          value={lookAhead}
          problem={problems.at("motion.lookAhead")}
          onChange={(value) => edit(withMotion(machine, { lookAhead: value as number }), "motion.lookAhead")}
        />
      )}
    </>
  );
}
