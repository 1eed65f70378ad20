import { changed, usePlanEdit, without } from './edit.ts';
import type { HoursForm, PeriodForm } from './plan-form.ts';
import { ClockSelect, WordSelect } from './small-fields.tsx';

const DAY_WORDS = [
  ['weekday', 'Monday to Friday'],
  ['weekend', 'Saturday and Sunday'],
  ['all', 'every day'],
] as const;

/** Hours to begin with: a weekday evening. */
export function hoursLike(): HoursForm {
  return { season: '', days: 'weekday', from: '16:00', to: '21:00' };
}

/** The hours of a period, by day of the week and season. */
export function Hours({
  period,
  at,
  put,
  error,
}: {
  period: PeriodForm;
  at: number;
  put: (changes: Partial<PeriodForm>) => void;
  error: (path: string) => string | undefined;
}) {
  const { form } = usePlanEdit();
  return (
    <>
      {period.hours.map((hours, row) => {
        const change = (changes: Partial<HoursForm>) => put({ hours: changed(period.hours, row, changes) });
        return (
          // biome-ignore lint/suspicious/noArrayIndexKey: a span of hours has no name but its place
          <div key={row} className="grid items-end gap-x-4 sm:grid-cols-[repeat(auto-fit,minmax(130px,1fr))]">
            <WordSelect label="On" value={hours.days} words={DAY_WORDS} onChange={(days) => change({ days })} />
            <ClockSelect label="From" value={hours.from} onChange={(from) => change({ from })} />
            <ClockSelect end label="Until" value={hours.to} onChange={(to) => change({ to })} />
            {form.seasons.length > 0 && (
              <WordSelect
                label="In"
                value={hours.season}
                words={[['', 'every season'], ...form.seasons.map(({ id, name }) => [id, name] as const)]}
                onChange={(season) => change({ season })}
              />
            )}
            {period.hours.length > 1 && (
              <button
                type="button"
                className="link hint min-h-11 text-left"
                onClick={() => put({ hours: without(period.hours, row) })}
              >
                Take out these hours
              </button>
            )}
            {error(`periods.${at}.hours.${row}`) && (
              <span className="field-error">{error(`periods.${at}.hours.${row}`)}</span>
            )}
          </div>
        );
      })}
      {error(`periods.${at}.hours`) && <span className="field-error">{error(`periods.${at}.hours`)}</span>}
      <button
        type="button"
        className="link hint mt-2 min-h-11"
        onClick={() => put({ hours: [...period.hours, hoursLike()] })}
      >
        Add hours to {period.label || 'this period'}
      </button>
    </>
  );
}
