import { useRef } from 'react';
import type { PlanInForce } from '#shared/facts/household.ts';
import { fullDate } from '#src/lib/format.ts';
import { Button } from '#src/ui/button.tsx';
import { SelectField, TextArea } from '#src/ui/field.tsx';
import { DayField } from './day-field.tsx';
import { Lever } from './lever.tsx';
import { PASTED } from './lever-texts.ts';
import { percentScale } from './scales.ts';
import { SliderField } from './slider-field.tsx';
import type { Tryout } from './use-try.ts';

/** What the utility may do. */
export function PriceLevers({ tryout, plans }: { tryout: Tryout; plans: readonly PlanInForce[] }) {
  const { priceRise, exportCut, plan } = tryout.draft.texts;
  return (
    <>
      <Lever
        tryout={tryout}
        name="priceRise"
        label="Prices rise faster or slower"
        hint="All the utility’s prices, fixed charges and export credits included."
      >
        <SliderField
          label="Rise each year"
          unit="%"
          value={priceRise.percent}
          error={tryout.errorAt('priceRise')}
          scale={percentScale(-2, 10)}
          onText={(percent) => tryout.set('priceRise', { percent })}
          onLeave={() => tryout.leave('priceRise')}
        />
      </Lever>
      <Lever tryout={tryout} name="exportCut" label="Credit for export is cut">
        <DayField tryout={tryout} lever="exportCut" part="from" label="From" />
        <SliderField
          label="What stays of it"
          unit="%"
          value={exportCut.keep}
          error={tryout.errorAt('exportCut.keep')}
          scale={percentScale(0, 100, 50)}
          onText={(keep) => tryout.set('exportCut', { keep })}
          onLeave={() => tryout.leave('exportCut.keep')}
        />
      </Lever>
      <Lever tryout={tryout} name="plan" label="Another rate plan">
        <DayField tryout={tryout} lever="plan" part="from" label="From" />
        <SelectField
          label="The plan"
          value={plan.which}
          error={tryout.errorAt('plan.which')}
          onChange={(event) => tryout.set('plan', { which: event.target.value })}
          onBlur={() => tryout.leave('plan.which')}
        >
          {plans.map((one, index) => (
            <option key={one.from} value={String(index)}>
              {one.plan.name === '' ? 'Rate plan' : one.plan.name}, from {fullDate(one.from)}
            </option>
          ))}
          <option value={PASTED}>a plan I paste here</option>
        </SelectField>
        {plan.which === PASTED && <PastedPlan tryout={tryout} />}
      </Lever>
    </>
  );
}

function PastedPlan({ tryout }: { tryout: Tryout }) {
  const file = useRef<HTMLInputElement>(null);
  return (
    <>
      <TextArea
        label="The plan as JSON"
        rows={5}
        spellCheck={false}
        value={tryout.draft.texts.plan.json}
        error={tryout.errorAt('plan.json')}
        onChange={(event) => tryout.set('plan', { json: event.target.value })}
        onBlur={() => tryout.leave('plan.json')}
      />
      <p className="mt-3">
        <Button look="plain" onClick={() => file.current?.click()}>
          Take in a plan from a file
        </Button>
      </p>
      <input
        ref={file}
        type="file"
        accept=".json,application/json"
        className="visually-hidden"
        tabIndex={-1}
        aria-label="A plan as a JSON file"
        onChange={async (event) => {
          const chosen = event.target.files?.[0];
          event.target.value = '';
          if (!chosen) return;
          tryout.set('plan', { json: await chosen.text() });
          tryout.leave('plan.json');
        }}
      />
    </>
  );
}
