import { useState } from 'react';
import type { MoneyView } from '#shared/api/money.ts';
import { decimal, fullDate, money } from '#src/lib/format.ts';
import { Button } from '#src/ui/button.tsx';
import { Field } from '#src/ui/field.tsx';
import { MoneyFigure } from '#src/ui/figure.tsx';
import { Money } from '#src/ui/money.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { FactsList } from './facts-list.tsx';
import { type ReceiptValues, readReceipt } from './money-values.ts';
import { RecordDialog } from './record-dialog.tsx';
import { RemoveButton } from './remove-button.tsx';

type ReceiptBody = Extract<ReturnType<typeof readReceipt>, { ok: true }>['body'];

/** The production incentive: earned by the meter, received as cash, the rest owed. */
export function IncentiveSheet({
  incentive,
  householdId,
  canEdit,
  today,
}: {
  incentive: NonNullable<MoneyView['incentive']>;
  householdId: string;
  canEdit: boolean;
  today: string;
}) {
  const [recording, setRecording] = useState(false);
  const { facts } = incentive;
  const separate = facts.paidAs === 'separate';
  return (
    <Sheet
      title="Production incentive"
      hint={`${facts.payer === '' ? 'The payer' : facts.payer}, $${decimal(facts.ratePerKwh)} per kWh from ${fullDate(facts.firstDay)} to ${fullDate(facts.lastDay)}, ${separate ? 'paid apart from the bill' : 'paid as a credit on the bill'}. Before income tax.`}
    >
      <FactsList
        rows={[
          { label: 'Earned', value: <Money cents={incentive.earnedCents} /> },
          { label: 'Received', value: <Money cents={incentive.receivedCents} /> },
          { label: 'Owed', value: <Money cents={incentive.owedCents} />, total: true },
        ]}
      />
      {separate && (
        <>
          <h3 className="mt-6">Received</h3>
          <ul className="mt-1 border-t border-rule">
            {facts.received.map((receipt) => (
              <li
                key={receipt.id}
                className="flex flex-wrap items-baseline justify-between gap-x-5 border-b border-rule py-2"
              >
                <span>
                  {fullDate(receipt.on)}
                  {receipt.note && <span className="hint">, {receipt.note}</span>}
                </span>
                <span className="ml-auto flex items-baseline gap-4">
                  {canEdit && (
                    <RemoveButton
                      what={`the receipt of ${fullDate(receipt.on)}`}
                      householdId={householdId}
                      change={{ kind: 'removeReceipt', id: receipt.id }}
                    />
                  )}
                  <span className="min-w-20 text-right">{money(receipt.amountCents)}</span>
                </span>
              </li>
            ))}
            {facts.received.length === 0 && (
              <li className="border-b border-rule py-2 text-soft">Nothing received yet.</li>
            )}
          </ul>
          {canEdit && (
            <p className="no-print mt-4">
              <Button look="plain" onClick={() => setRecording(true)}>
                Record a cheque
              </Button>
            </p>
          )}
        </>
      )}
      {incentive.earned.length > 0 && (
        <details className="mt-5">
          <summary className="link inline-flex min-h-11 cursor-pointer items-center">Earned, cycle by cycle</summary>
          <ul className="border-t border-rule">
            {incentive.earned.map((entry) => (
              <li key={entry.id} className="flex items-baseline justify-between gap-5 border-b border-rule py-2">
                <span>
                  {fullDate(entry.date)}
                  {entry.estimated && <span className="hint">, an estimate</span>}
                </span>
                <MoneyFigure title={entry.label} cents={entry.amountCents} working={entry.working} />
              </li>
            ))}
          </ul>
        </details>
      )}
      {recording && (
        <RecordDialog<ReceiptValues, ReceiptBody>
          title="Record money received"
          hint="As it came: by cheque or transfer, on the day it came."
          householdId={householdId}
          defaults={{ on: today, amountCents: '', note: '', from: '', to: '', quantityWh: '' }}
          read={readReceipt}
          change={(body) => ({ kind: 'receipt', body })}
          onClose={() => setRecording(false)}
        >
          {({ register, formState: { errors } }) => (
            <>
              <Field label="Received on" type="date" error={errors.on?.message} {...register('on')} />
              <Field
                label="Amount"
                unit="$"
                inputMode="decimal"
                error={errors.amountCents?.message}
                {...register('amountCents')}
              />
              <div className="grid gap-x-6 sm:grid-cols-2">
                <Field
                  label="Covers from"
                  type="date"
                  hint="as its letter says"
                  error={errors.from?.message}
                  {...register('from')}
                />
                <Field
                  label="to and with"
                  type="date"
                  hint="the last day paid for"
                  error={errors.to?.message}
                  {...register('to')}
                />
              </div>
              <Field
                label="kWh paid on"
                unit="kWh"
                inputMode="decimal"
                hint="if it says so"
                error={errors.quantityWh?.message}
                {...register('quantityWh')}
              />
              <Field label="Note" maxLength={200} {...register('note')} />
            </>
          )}
        </RecordDialog>
      )}
    </Sheet>
  );
}
