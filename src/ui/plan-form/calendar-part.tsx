import { Field, TextArea } from '../field.tsx';
import { Fold } from '../fold.tsx';
import { AddRow, Columns, FormRow } from '../rows.tsx';
import { Tick } from '../ticks.tsx';
import { changed, usePlanEdit, without } from './edit.ts';
import { Hours, hoursLike } from './hours-fields.tsx';
import { freeId } from './new-parts.ts';
import type { PeriodForm, PlanForm } from './plan-form.ts';
import { WordSelect, YearlyDay } from './small-fields.tsx';

/** Seasons, times of day and holidays, as the sheet sets them out before its prices. */
export function CalendarPart() {
  const { form } = usePlanEdit();
  const seasons = form.seasons.length === 0 ? 'one price all year' : form.seasons.map(({ name }) => name).join(', ');
  const periods = form.periods.length === 0 ? 'one price all day' : form.periods.map(({ label }) => label).join(', ');
  return (
    <div className="mt-6">
      <Fold title="Seasons" summary={seasons} open={form.seasons.length > 0}>
        <Seasons />
      </Fold>
      <Fold title="Times of day" summary={periods} open={form.periods.length > 0}>
        <Periods />
      </Fold>
    </div>
  );
}

/** Energy that was one price is priced by what the sheet now tells apart. */
function energyBy(form: PlanForm, by: 'bySeason' | 'byPeriod'): PlanForm['charges'] {
  return form.charges.map((charge) => (charge.kind === 'import' ? { ...charge, [by]: true } : charge));
}

function Seasons() {
  const { form, set, text } = usePlanEdit();
  const { seasons } = form;
  const add = () => {
    const ids = seasons.map(({ id }) => id);
    if (seasons.length > 0) {
      const id = freeId(ids, 'season');
      set({ seasons: [...seasons, { id, name: '', from: '01-01', to: '12-31' }] });
      return;
    }
    set({
      seasons: [
        { id: 'summer', name: 'Summer', from: '06-01', to: '09-30' },
        { id: 'winter', name: 'Winter', from: '10-01', to: '05-31' },
      ],
      charges: energyBy(form, 'bySeason'),
    });
  };
  return (
    <>
      <p className="hint">Together they cover the whole year. Both days count.</p>
      {seasons.map((season, at) => {
        const put = (changes: Partial<(typeof seasons)[number]>) => set({ seasons: changed(seasons, at, changes) });
        return (
          <FormRow
            key={season.id}
            title={`Season ${at + 1}`}
            onRemove={() => set({ seasons: without(seasons, at), ...unusedSeasons(form, seasons.length - 1) })}
          >
            <Field label="Name of the season" {...text(`seasons.${at}.name`, season.name, (name) => put({ name }))} />
            <Columns>
              <YearlyDay label="First day" value={season.from} onChange={(from) => put({ from })} />
              <YearlyDay label="Last day" value={season.to} onChange={(to) => put({ to })} />
            </Columns>
          </FormRow>
        );
      })}
      <AddRow onClick={add}>{seasons.length === 0 ? 'Prices differ by season' : 'Add a season'}</AddRow>
    </>
  );
}

/** Without seasons (or periods) nothing can be priced by them. */
function unusedSeasons(form: PlanForm, left: number): Partial<PlanForm> {
  if (left > 0) return {};
  return {
    charges: form.charges.map((charge) => ({ ...charge, bySeason: false })),
    credits: form.credits.map((credit) => ({ ...credit, bySeason: false })),
  };
}
function unusedPeriods(form: PlanForm, left: number): Partial<PlanForm> {
  if (left > 0) return {};
  return {
    netting: form.netting === 'period' ? 'cycle' : form.netting,
    charges: form.charges.map((charge) => ({ ...charge, byPeriod: false })),
    credits: form.credits.map((credit) => ({ ...credit, byPeriod: false })),
    banks: form.banks.map((bank) => ({ ...bank, byPeriod: false })),
  };
}

function Periods() {
  const { form, set, text, error } = usePlanEdit();
  const { periods } = form;
  const add = () => {
    if (periods.length > 0) {
      const id = freeId(
        periods.map((period) => period.id),
        'period',
      );
      const rest = periods.findIndex((period) => period.rest);
      const made: PeriodForm = { id, label: '', rest: false, hours: [hoursLike()] };
      // "All other hours" stays last, as on the sheet.
      set({ periods: rest < 0 ? [...periods, made] : [...periods.slice(0, rest), made, ...periods.slice(rest)] });
      return;
    }
    set({
      periods: [
        { id: 'peak', label: 'On-peak', rest: false, hours: [hoursLike()] },
        { id: 'offPeak', label: 'Off-peak', rest: true, hours: [] },
      ],
      charges: energyBy(form, 'byPeriod'),
      // What is taken off within the month has to be taken off where it was priced.
      netting: form.netting === 'cycle' ? 'period' : form.netting,
      banks: form.banks.map((bank) =>
        bank.unit === 'kWh' && form.netting === 'cycle' ? { ...bank, byPeriod: true } : bank,
      ),
    });
  };
  return (
    <>
      {periods.map((period, at) => {
        const put = (changes: Partial<PeriodForm>) => set({ periods: changed(periods, at, changes) });
        return (
          <FormRow
            key={period.id}
            title={`Period ${at + 1}`}
            onRemove={() => set({ periods: without(periods, at), ...unusedPeriods(form, periods.length - 1) })}
          >
            <Columns>
              <Field
                label="Name of the period"
                {...text(`periods.${at}.label`, period.label, (label) => put({ label }))}
              />
              <Tick
                label="All other hours"
                checked={period.rest}
                onChange={(rest) => put({ rest, hours: rest ? [] : [hoursLike()] })}
              />
            </Columns>
            {!period.rest && <Hours period={period} at={at} put={put} error={error} />}
          </FormRow>
        );
      })}
      <AddRow onClick={add}>{periods.length === 0 ? 'Prices differ by time of day' : 'Add a period'}</AddRow>
      {periods.length > 0 && (
        <Columns>
          <TextArea
            label="Holidays"
            hint="One date on a line, as 2026-07-04. Leave empty if the sheet names none."
            rows={3}
            {...text('holidays', form.holidays, (holidays) => set({ holidays }))}
          />
          <WordSelect
            label="A holiday counts as"
            value={form.holidaysAs}
            words={[
              ['weekend', 'a Saturday or Sunday'],
              ['weekday', 'a weekday'],
            ]}
            onChange={(holidaysAs) => set({ holidaysAs })}
          />
        </Columns>
      )}
    </>
  );
}
