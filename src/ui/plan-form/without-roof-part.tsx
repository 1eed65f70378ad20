import { useState } from 'react';
import type { RatePlan } from '#shared/settlement/plan.ts';
import { planWithoutRoof } from '#shared/settlement/without-roof.ts';
import type { Day } from '#shared/units/day.ts';
import { Button } from '../button.tsx';
import { Choices } from '../field.tsx';
import { Part } from '../rows.tsx';
import type { FormFault } from './edit.ts';
import { withExportRule } from './export-rule.ts';
import { ordinaryPlan, type PlanEntry } from './plan-entry.ts';
import { emptyText, type PlanText, textOf } from './plan-text.ts';
import { PlanTextFields } from './plan-text-fields.tsx';
import { WordSelect } from './small-fields.tsx';

/** Another plan of the household, to begin with. */
export type OtherPlan = { label: string; from: string; plan: RatePlan };

/** The plan the house would have without a roof: what the bill is held against in *bill avoided*. */
export function WithoutRoofPart({
  entry,
  onChange,
  timeZone,
  others,
  faults,
  refused,
  showAll,
  prefix,
}: {
  entry: PlanEntry;
  onChange: (entry: PlanEntry) => void;
  timeZone: string;
  others: readonly OtherPlan[];
  faults: readonly FormFault[];
  refused: readonly FormFault[];
  showAll: boolean;
  prefix: string;
}) {
  const [begin, setBegin] = useState('this');
  const ordinary = ordinaryPlan(entry, timeZone);
  const started = (from: string) => {
    if (from === 'this') return ordinary ? textOf(ordinary.plan, entry.from) : bareText(entry.from);
    const other = others[Number(from)];
    return other
      ? textOf(planWithoutRoof({ from: '' as Day, plan: other.plan, withoutRoof: null }), entry.from)
      : bareText(entry.from);
  };
  return (
    <Part
      title="Without the roof"
      hint="The bill you avoid is what the same use would have cost without a roof, on the plan said here."
    >
      <Choices
        legend="Would the house be on another plan without the roof?"
        name={`${prefix}.withoutRoof`}
        value={entry.withoutRoof}
        onChange={(value) =>
          onChange(
            value === 'other'
              ? { ...entry, withoutRoof: 'other', other: entry.other ?? started('this') }
              : { ...entry, withoutRoof: 'same' },
          )
        }
        options={[
          {
            value: 'same',
            label: 'No, on this one without what is there because of the roof',
            hint: leftOutWords(ordinary),
          },
          { value: 'other', label: 'Yes, on another one', hint: 'As the sheet of the ordinary plan has it.' },
        ]}
      />
      {entry.withoutRoof === 'other' && entry.other && (
        <div className="mt-5 border-l-2 border-rule pl-5 max-sm:pl-3">
          <div className="flex flex-wrap items-end gap-x-5 gap-y-3">
            <div className="min-w-0 flex-1 basis-60">
              <WordSelect
                label="Begin with"
                value={begin}
                words={[
                  ['this', 'this plan, without what is there because of the roof'],
                  ...others.map(({ label }, index) => [String(index), label] as const),
                  ['empty', 'an empty sheet'],
                ]}
                onChange={setBegin}
              />
            </div>
            <Button look="plain" onClick={() => onChange({ ...entry, other: started(begin) })}>
              Begin with it
            </Button>
          </div>
          <p className="hint mt-2">This replaces what is written below.</p>
          <PlanTextFields
            text={entry.other}
            onChange={(other) => onChange({ ...entry, other })}
            timeZone={timeZone}
            faults={faults}
            refused={refused}
            showAll={showAll}
            prefix={`${prefix}.other`}
            bare
          />
        </div>
      )}
    </Part>
  );
}

/** An empty sheet of a house that sends nothing out. */
function bareText(from: string): PlanText {
  const text = emptyText(from);
  return { ...text, form: withExportRule(text.form, 'nothing') };
}

function leftOutWords(ordinary: { leftOut: string[] } | null): string {
  if (ordinary === null) return 'What is left out is listed here once the plan reads.';
  return ordinary.leftOut.length === 0 ? 'Nothing is left out of it.' : `Left out: ${ordinary.leftOut.join(', ')}.`;
}
