import { useState } from 'react';
import type { MoneyView } from '#shared/api/money.ts';
import { type CostFacts, costKind, INCOME_KINDS } from '#shared/facts/house.ts';
import { negateCents } from '#shared/units/cents.ts';
import { fullDate } from '#src/lib/format.ts';
import { Button } from '#src/ui/button.tsx';
import { Field, SelectField } from '#src/ui/field.tsx';
import { Money } from '#src/ui/money.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { type CostValues, readCost } from './money-values.ts';
import { COST_KINDS } from './money-words.ts';
import { RecordDialog } from './record-dialog.tsx';
import { RemoveButton } from './remove-button.tsx';

type CostBody = Extract<ReturnType<typeof readCost>, { ok: true }>['body'];

/** Costs and income outside the other books, newest first. */
export function CostsSheet({
  view,
  householdId,
  canEdit,
  today,
}: {
  view: MoneyView;
  householdId: string;
  canEdit: boolean;
  today: string;
}) {
  const [recording, setRecording] = useState(false);
  const costs = [...view.costs].sort((a, b) => (a.on < b.on ? 1 : a.on > b.on ? -1 : 0));
  return (
    <Sheet
      title="Costs and income"
      hint="Cash at signing, permits, upkeep, repairs, rebates, patronage: what stands in no other book."
    >
      <table className="ruled ruled-stack">
        <thead>
          <tr>
            <th scope="col">Date</th>
            <th scope="col" className="text">
              What
            </th>
            <th scope="col" className="text">
              Kind
            </th>
            <th scope="col">Amount</th>
            {canEdit && (
              <td className="no-print">
                <span className="visually-hidden">Remove</span>
              </td>
            )}
          </tr>
        </thead>
        <tbody>
          {costs.map((cost) => (
            <tr key={cost.id}>
              <th scope="row" className="whitespace-nowrap">
                {fullDate(cost.on)}
              </th>
              <td className="text" data-label="What">
                {cost.label}
              </td>
              <td className="text text-soft" data-label="Kind">
                {COST_KINDS[cost.kind]}
              </td>
              <td data-label="Amount">
                <Money cents={signed(cost)} />
              </td>
              {canEdit && (
                <td className="no-print" data-label="">
                  <RemoveButton
                    what={cost.label}
                    householdId={householdId}
                    change={{ kind: 'removeCost', id: cost.id }}
                  />
                </td>
              )}
            </tr>
          ))}
          {costs.length === 0 && (
            <tr>
              <td colSpan={5} className="text text-soft">
                None recorded.
              </td>
            </tr>
          )}
          <tr className="subtotal">
            <th scope="row">Paid</th>
            <td />
            <td />
            <td data-label="In all">
              <Money cents={negateCents(view.costsCents)} />
            </td>
            {canEdit && <td className="no-print" />}
          </tr>
          <tr className="subtotal">
            <th scope="row">Received</th>
            <td />
            <td />
            <td data-label="In all">
              <Money cents={view.incomeCents} />
            </td>
            {canEdit && <td className="no-print" />}
          </tr>
        </tbody>
      </table>
      {canEdit && (
        <p className="no-print mt-4">
          <Button look="plain" onClick={() => setRecording(true)}>
            Record a cost or an income
          </Button>
        </p>
      )}
      {recording && (
        <RecordDialog<CostValues, CostBody>
          title="Record a cost or an income"
          hint="The kind says which way the money went."
          householdId={householdId}
          defaults={{ on: today, kind: 'upkeep', label: '', amountCents: '' }}
          read={readCost}
          change={(body) => ({ kind: 'cost', body })}
          onClose={() => setRecording(false)}
        >
          {({ register, formState: { errors } }) => (
            <>
              <Field label="Date" type="date" error={errors.on?.message} {...register('on')} />
              <SelectField label="Kind" error={errors.kind?.message} {...register('kind')}>
                <optgroup label="Money paid">
                  {costKind.options
                    .filter((kind) => !INCOME_KINDS.includes(kind))
                    .map((kind) => (
                      <option key={kind} value={kind}>
                        {COST_KINDS[kind]}
                      </option>
                    ))}
                </optgroup>
                <optgroup label="Money received">
                  {INCOME_KINDS.map((kind) => (
                    <option key={kind} value={kind}>
                      {COST_KINDS[kind]}
                    </option>
                  ))}
                </optgroup>
              </SelectField>
              <Field label="What" maxLength={160} error={errors.label?.message} {...register('label')} />
              <Field
                label="Amount"
                unit="$"
                inputMode="decimal"
                error={errors.amountCents?.message}
                {...register('amountCents')}
              />
            </>
          )}
        </RecordDialog>
      )}
    </Sheet>
  );
}

function signed(cost: CostFacts) {
  return INCOME_KINDS.includes(cost.kind) ? cost.amountCents : negateCents(cost.amountCents);
}
