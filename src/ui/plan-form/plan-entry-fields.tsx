import { useState } from 'react';
import { Field } from '../field.tsx';
import type { FormFault } from './edit.ts';
import { entryFaults, holdingFrom, type PlanEntry } from './plan-entry.ts';
import { PlanTextFields, within } from './plan-text-fields.tsx';
import { type OtherPlan, WithoutRoofPart } from './without-roof-part.tsx';

/** A plan of a household: since when, what it says, and what would hold without a roof. Used wherever a plan is written. */
export function PlanEntryFields({
  entry,
  onChange,
  timeZone,
  others = [],
  refused = [],
  refusedWithoutRoof = [],
  showAll,
  prefix,
}: {
  entry: PlanEntry;
  onChange: (entry: PlanEntry) => void;
  timeZone: string;
  /** The household's other plans: to begin one with, and whose days are taken. */
  others?: readonly OtherPlan[];
  /** The server's faults, by path in the plan and in the plan without a roof. */
  refused?: readonly FormFault[];
  refusedWithoutRoof?: readonly FormFault[];
  showAll: boolean;
  prefix: string;
}) {
  const [left, setLeft] = useState(false);
  const faults = entryFaults(
    entry,
    others.map(({ from }) => from),
  );
  return (
    <>
      <Field
        label="Holds from"
        hint="It starts with the first cycle that begins on or after this day; cycles before the first plan use the first."
        type="date"
        className="max-w-[220px]"
        name={`${prefix}.from`}
        value={entry.from}
        error={showAll || left ? faults.find(({ path }) => path === 'from')?.message : undefined}
        onChange={(event) => onChange(holdingFrom(entry, event.target.value))}
        onBlur={() => setLeft(true)}
      />
      <PlanTextFields
        text={entry}
        onChange={onChange}
        timeZone={timeZone}
        faults={faults}
        refused={refused}
        showAll={showAll}
        prefix={prefix}
      />
      <WithoutRoofPart
        entry={entry}
        onChange={onChange}
        timeZone={timeZone}
        others={others}
        faults={within(faults, 'other.')}
        refused={refusedWithoutRoof}
        showAll={showAll}
        prefix={prefix}
      />
    </>
  );
}
