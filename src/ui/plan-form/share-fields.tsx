import { Field } from '../field.tsx';
import { Columns } from '../rows.tsx';
import { toggled, usePlanEdit } from './edit.ts';
import type { ShareForm } from './plan-form.ts';
import { TickList } from './small-fields.tsx';

/** A price that is a share of what named charges cost. */
export function ShareFields({
  part,
  path,
  put,
}: {
  part: ShareForm;
  path: string;
  put: (changes: Partial<ShareForm>) => void;
}) {
  const { form, text, error } = usePlanEdit();
  const byKwh = form.charges.filter(({ basis }) => basis === 'import' || basis === 'load');
  const tiered = byKwh.some(({ tiers }) => tiers.length > 0);
  return (
    <>
      <TickList
        legend="The price is taken from"
        error={error(`${path}.shareOf`) ?? error(`${path}.ratesOf`)}
        options={byKwh.map(({ id, label }) => ({ value: id, label }))}
        ticked={part.shareOf}
        onChange={(id, on) => put({ shareOf: toggled(part.shareOf, id, on) })}
      />
      <Columns>
        <Field
          label="Share of that price"
          inputMode="decimal"
          unit="%"
          hint="100 for the full retail price."
          {...text(`${path}.sharePercent`, part.sharePercent, (sharePercent) => put({ sharePercent }))}
        />
        {(tiered || part.shareTier !== '1') && (
          <Field
            label="At the price of tier"
            inputMode="numeric"
            {...text(`${path}.shareTier`, part.shareTier, (shareTier) => put({ shareTier }))}
          />
        )}
      </Columns>
    </>
  );
}
