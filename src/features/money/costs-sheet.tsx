import { useState } from 'react';
import type { CostsView } from '#shared/api/money-other.ts';
import type { CostFacts } from '#shared/facts/house.ts';
import { fullDate } from '#src/lib/format.ts';
import { Button } from '#src/ui/button.tsx';
import { MoneyFigure } from '#src/ui/figure.tsx';
import { Money } from '#src/ui/money.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { CostDialog } from './costs-dialog.tsx';
import { CostsTotals } from './costs-totals.tsx';
import { signedCents, whenWords } from './costs-values.ts';
import { COST_KINDS } from './money-words.ts';
import { OtherRemove } from './other-remove.tsx';
import { PaperLink } from './paper-link.tsx';

type Given = { householdId: string; canEdit: boolean; today: string };

/** Costs, losses and income outside the other books, once or recurring, newest first. */
export function CostsSheet({ view, ...given }: { view: CostsView } & Given) {
  const [editing, setEditing] = useState<CostFacts | 'new' | null>(null);
  const costs = [...view.costs].sort((a, b) => (a.on < b.on ? 1 : a.on > b.on ? -1 : 0));
  const { householdId, canEdit, today } = given;
  return (
    <Sheet
      title="Costs, losses and income"
      hint="Cash at signing, permits, upkeep, a deposit lost, rebates, patronage: what stands in no other book. Income is before income tax."
    >
      <table className="ruled ruled-stack">
        <thead>
          <tr>
            <th scope="col" className="text">
              What
            </th>
            <th scope="col" className="text">
              When
            </th>
            <th scope="col" className="text">
              Kind
            </th>
            <th scope="col">Amount</th>
            <th scope="col">So far</th>
            {canEdit && (
              <td className="no-print">
                <span className="visually-hidden">Change or remove</span>
              </td>
            )}
          </tr>
        </thead>
        <tbody>
          {costs.map((cost) => (
            <CostRow key={cost.id} cost={cost} view={view} {...given} onChange={() => setEditing(cost)} />
          ))}
          {costs.length === 0 && (
            <tr>
              <td colSpan={6} className="text text-soft">
                None recorded.
              </td>
            </tr>
          )}
          <Total label="Paid" figure={view.paid} canEdit={canEdit} />
          <Total label="Received" figure={view.received} canEdit={canEdit} />
        </tbody>
      </table>
      <CostsTotals view={view} />
      {canEdit && (
        <p className="no-print mt-4">
          <Button look="plain" onClick={() => setEditing('new')}>
            Record a cost or an income
          </Button>
        </p>
      )}
      {editing !== null && (
        <CostDialog
          cost={editing === 'new' ? null : editing}
          householdId={householdId}
          today={today}
          onClose={() => setEditing(null)}
        />
      )}
    </Sheet>
  );
}

function CostRow({
  cost,
  view,
  householdId,
  canEdit,
  onChange,
}: { cost: CostFacts; view: CostsView; onChange: () => void } & Given) {
  const standing = view.standings.find(({ id }) => id === cost.id);
  return (
    <tr>
      <th scope="row" className="text">
        {cost.label}
        <PaperOf householdId={householdId} documentId={cost.documentId} />
      </th>
      <td className="text" data-label="When">
        <span>
          {whenWords(cost)}
          {standing && cost.every !== null && (
            <span className="hint block">
              {standing.nextOn === null ? 'It does not come again.' : `Next ${fullDate(standing.nextOn)}.`}
            </span>
          )}
          {standing && cost.every === null && standing.times === 0 && (
            <span className="hint block">Not yet; the projection counts it.</span>
          )}
        </span>
      </td>
      <td className="text text-soft" data-label="Kind">
        {COST_KINDS[cost.kind]}
      </td>
      <td data-label="Amount">
        <MoneyFigure title={cost.label} cents={signedCents(cost)} working={standing?.each?.working ?? null} />
      </td>
      <td data-label="So far">
        <span>
          <Money cents={standing?.toDateCents ?? null} />
          {standing && standing.times > 1 && <span className="hint block">{standing.times} times</span>}
        </span>
      </td>
      {canEdit && (
        <td className="no-print" data-label="">
          <span className="inline-flex flex-wrap justify-end gap-x-4">
            <button
              type="button"
              className="link min-h-11 text-[15px] text-soft sm:min-h-9"
              aria-label={`Change ${cost.label}`}
              onClick={onChange}
            >
              Change
            </button>
            <OtherRemove what={cost.label} householdId={householdId} change={{ kind: 'removeCost', id: cost.id }} />
          </span>
        </td>
      )}
    </tr>
  );
}

function PaperOf(props: { householdId: string; documentId: string | null }) {
  return (
    <span className="block font-normal">
      <PaperLink {...props} />
    </span>
  );
}

function Total({ label, figure, canEdit }: { label: string; figure: CostsView['paid']; canEdit: boolean }) {
  return (
    <tr className="subtotal">
      <th scope="row" className="text">
        {label}
      </th>
      <td />
      <td />
      <td />
      <td data-label="In all">
        <MoneyFigure title={`${label}, in all`} cents={figure.amountCents} working={figure.working} />
      </td>
      {canEdit && <td className="no-print" />}
    </tr>
  );
}
