import { Field } from '../field.tsx';
import { changed, usePlanEdit, without } from './edit.ts';
import type { ChargeForm } from './plan-form.ts';
import { WordSelect } from './small-fields.tsx';

/** Where a charge's tiers end, since when, and whether by bill or by day. */
export function Tiers({
  charge,
  path,
  put,
}: {
  charge: ChargeForm;
  path: string;
  put: (changes: Partial<ChargeForm>) => void;
}) {
  const { form, text } = usePlanEdit();
  return (
    <>
      {charge.tiers.map((row, index) => {
        const change = (changes: Partial<typeof row>) => put({ tiers: changed(charge.tiers, index, changes) });
        return (
          // biome-ignore lint/suspicious/noArrayIndexKey: a row of limits has no name but its place
          <div key={index} className="grid items-end gap-x-4 sm:grid-cols-[repeat(auto-fit,minmax(150px,1fr))]">
            <Field
              label="Tiers end at"
              unit="kWh"
              hint={index === 0 ? 'Every tier but the last, as 500; 1000' : undefined}
              {...text(`${path}.tiers.${index}.limits`, row.limits, (limits) => change({ limits }))}
            />
            <WordSelect
              label="Counted"
              value={row.per}
              words={[
                ['cycle', 'for each bill'],
                ['day', 'for each day of it'],
              ]}
              onChange={(per) => change({ per })}
            />
            {form.seasons.length > 0 && (
              <WordSelect
                label="In"
                value={row.season}
                words={[['', 'every season'], ...form.seasons.map(({ id, name }) => [id, name] as const)]}
                onChange={(season) => change({ season })}
              />
            )}
            <Field
              label="From the day"
              type="date"
              {...text(`${path}.tiers.${index}.from`, row.from, (from) => change({ from }))}
            />
          </div>
        );
      })}
      <p className="flex flex-wrap gap-x-5">
        <button
          type="button"
          className="link hint mt-2 min-h-11"
          onClick={() => put({ tiers: [...charge.tiers, { from: '', season: '', per: 'cycle', limits: '' }] })}
        >
          Add other tiers
        </button>
        {charge.tiers.length > 1 && (
          <button
            type="button"
            className="link hint mt-2 min-h-11"
            onClick={() => put({ tiers: without(charge.tiers, charge.tiers.length - 1) })}
          >
            Take out the last ones
          </button>
        )}
      </p>
    </>
  );
}
