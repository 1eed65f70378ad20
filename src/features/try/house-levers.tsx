import { Field, SelectField } from '#src/ui/field.tsx';
import { Columns } from '#src/ui/rows.tsx';
import { DayField } from './day-field.tsx';
import { Lever } from './lever.tsx';
import { kwhScale, percentScale } from './scales.ts';
import { SliderField } from './slider-field.tsx';
import type { Tryout } from './use-try.ts';

/** What may happen in the house and on its roof. */
export function HouseLevers({ tryout }: { tryout: Tryout }) {
  const { moreUse, degradation, replacement, sale } = tryout.draft.texts;
  return (
    <>
      <Lever tryout={tryout} name="moreUse" label="The house uses more: a car to charge">
        <DayField tryout={tryout} lever="moreUse" part="from" label="From" />
        <SliderField
          label="More use"
          unit="kWh a day"
          value={moreUse.whPerDay}
          error={tryout.errorAt('moreUse.whPerDay')}
          scale={kwhScale(40)}
          onText={(whPerDay) => tryout.set('moreUse', { whPerDay })}
          onLeave={() => tryout.leave('moreUse.whPerDay')}
        />
        <Columns>
          <SelectField
            label="Between"
            value={moreUse.fromHour}
            error={tryout.errorAt('moreUse.fromHour')}
            onChange={(event) => tryout.set('moreUse', { fromHour: event.target.value })}
          >
            <Hours first={0} last={23} />
          </SelectField>
          <SelectField
            label="and"
            value={moreUse.toHour}
            error={tryout.errorAt('moreUse.toHour')}
            onChange={(event) => {
              tryout.set('moreUse', { toHour: event.target.value });
            }}
            onBlur={() => tryout.leave('moreUse.toHour')}
          >
            <Hours first={1} last={24} />
          </SelectField>
        </Columns>
      </Lever>
      <Lever tryout={tryout} name="degradation" label="The panels age faster or slower">
        <SliderField
          label="Production lost each year"
          unit="%"
          value={degradation.percent}
          error={tryout.errorAt('degradation')}
          scale={percentScale(0, 3)}
          onText={(percent) => tryout.set('degradation', { percent })}
          onLeave={() => tryout.leave('degradation')}
        />
      </Lever>
      <Lever tryout={tryout} name="replacement" label="An inverter is replaced">
        <DayField tryout={tryout} lever="replacement" part="on" label="On" />
        <Field
          label="Cost"
          unit="$"
          inputMode="decimal"
          className="input-number max-w-[150px]"
          value={replacement.costCents}
          error={tryout.errorAt('replacement.costCents')}
          onChange={(event) => tryout.set('replacement', { costCents: event.target.value })}
          onBlur={() => tryout.leave('replacement.costCents')}
        />
      </Lever>
      <Lever tryout={tryout} name="sale" label="The house is sold">
        <DayField tryout={tryout} lever="sale" part="on" label="On" />
        <Field
          label="What the buyer pays for the roof"
          hint="What the house sells for beyond one like it without a roof. Yours to judge."
          unit="$"
          inputMode="decimal"
          className="input-number max-w-[150px]"
          value={sale.roofValueCents}
          error={tryout.errorAt('sale.roofValueCents')}
          onChange={(event) => tryout.set('sale', { roofValueCents: event.target.value })}
          onBlur={() => tryout.leave('sale.roofValueCents')}
        />
      </Lever>
    </>
  );
}

function Hours({ first, last }: { first: number; last: number }) {
  return Array.from({ length: last - first + 1 }, (_, index) => first + index).map((hour) => (
    <option key={hour} value={String(hour)}>
      {hourWords(hour)}
    </option>
  ));
}

/** "midnight", "6 am", "noon", "10 pm" */
export function hourWords(hour: number): string {
  if (hour % 24 === 0) return 'midnight';
  if (hour === 12) return 'noon';
  return hour < 12 ? `${hour} am` : `${hour - 12} pm`;
}
