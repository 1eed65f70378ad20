import { useState } from 'react';
import type { MoneyView } from '#shared/api/money.ts';
import { addDays } from '#shared/units/day.ts';
import { kwhText } from '#shared/units/energy.ts';
import { cycleRangeWithYear, decimal, fullDate, kwh, money } from '#src/lib/format.ts';
import { Button } from '#src/ui/button.tsx';
import { MoneyFigure } from '#src/ui/figure.tsx';
import { Money } from '#src/ui/money.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { FactsList, type FactsRow } from './facts-list.tsx';
import { IncentiveCycles } from './incentive-cycles.tsx';
import { ReceiptDialog } from './receipt-dialog.tsx';
import { RemoveButton } from './remove-button.tsx';

type Incentive = NonNullable<MoneyView['incentive']>;

/** The production incentive: earned by the meter, received as cash, the rest owed. */
export function IncentiveSheet({
  incentive,
  householdId,
  canEdit,
  today,
}: {
  incentive: Incentive;
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
      {incentive.unmatchedCents !== 0 && (
        <p className="hint mt-2">
          {money(incentive.unmatchedCents)} of what came pays no cycle that has earned anything: paid ahead, too much,
          or for days that are on no statement yet.
        </p>
      )}
      <h3 className="mt-6">Left of the term</h3>
      {incentive.left === null ? (
        <p className="border-y border-rule py-2 text-soft">The term is over.</p>
      ) : (
        <FactsList rows={leftRows(incentive.left)} />
      )}
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
                  {coverWords(receipt) && <span className="hint block">{coverWords(receipt)}</span>}
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
      {incentive.cycles.length > 0 && <IncentiveCycles cycles={incentive.cycles} separate={separate} />}
      {recording && <ReceiptDialog householdId={householdId} today={today} onClose={() => setRecording(false)} />}
    </Sheet>
  );
}

/** "covers 1 Jul – 30 Sep 2026, 3,120 kWh"; null where the receipt says neither. */
function coverWords({ from, to, quantityWh }: Incentive['facts']['received'][number]): string | null {
  const days = from === null || to === null ? null : `covers ${cycleRangeWithYear(from, addDays(to, -1))}`;
  const energy = quantityWh === null ? null : `${decimal(kwhText(quantityWh))} kWh`;
  const said = [days, energy].filter((part) => part !== null);
  return said.length === 0 ? null : said.join(', ');
}

function leftRows({ lastDay, months, expectedWh, figure }: NonNullable<Incentive['left']>): FactsRow[] {
  const rows: FactsRow[] = [
    { label: 'Last day', value: fullDate(lastDay) },
    { label: 'Months left, this one counted', value: String(months) },
  ];
  if (figure === null || expectedWh === null) return rows;
  const hint = `An estimate: ${kwh(expectedWh)} kWh by the installer’s figures, aged. Before income tax.`;
  const value = (
    <MoneyFigure title="Still to be earned, an estimate" cents={figure.amountCents} working={figure.working} />
  );
  return [...rows, { label: 'Still to be earned', value, hint }];
}
