import type { ReactNode } from 'react';
import type { CycleRow } from '#shared/api/cycles.ts';
import { type Cents, dollarsText } from '#shared/units/cents.ts';
import { kwhText, type Wh } from '#shared/units/energy.ts';
import { kwh } from '#src/lib/format.ts';
import { Kwh, Missing, Money } from '#src/ui/money.tsx';
import { stateWords } from './state-words.ts';

/** A column of the cycles table: what it sorts by, shows, adds up to and exports. */
export type CycleColumn = {
  id: string;
  head: string;
  /** The unit under the head. */
  unit: string | null;
  sortBy: (row: CycleRow) => number | string | null;
  cell: (row: CycleRow) => ReactNode;
  /** The parts of the year's subtotal; null where a column does not add up. */
  sum: { of: (row: CycleRow) => number | null; show: (total: number) => ReactNode } | null;
  csv: (row: CycleRow) => string;
};

const energy = (id: string, head: string, of: (row: CycleRow) => Wh | null, missing: string): CycleColumn => ({
  id,
  head,
  unit: 'kWh',
  sortBy: of,
  cell: (row) => <Kwh wh={of(row)} missing={missing} />,
  sum: { of, show: (total) => kwh(total as Wh) },
  csv: (row) => {
    const amount = of(row);
    return amount === null ? '' : kwhText(amount);
  },
});

const amount = (id: string, head: string, of: (row: CycleRow) => Cents | null): CycleColumn => ({
  id,
  head,
  unit: null,
  sortBy: of,
  cell: (row) => <Money cents={of(row)} />,
  sum: { of, show: (total) => <Money cents={total as Cents} /> },
  csv: (row) => {
    const value = of(row);
    return value === null ? '' : dollarsText(value);
  },
});

/** Every column but the first (the cycle's dates), in order. */
export const CYCLE_COLUMNS: readonly CycleColumn[] = [
  {
    id: 'days',
    head: 'Days',
    unit: null,
    sortBy: (row) => row.days,
    cell: (row) => row.days,
    sum: { of: (row) => row.days, show: (total) => total },
    csv: (row) => String(row.days),
  },
  energy('made', 'Made', (row) => row.productionWh, 'No production for this cycle'),
  energy('usedAtHome', 'Used at home', (row) => row.selfUseWh, 'Needs both production and export'),
  energy('sentOut', 'Sent out', (row) => row.exportWh, 'No export for this cycle'),
  energy('bought', 'Bought', (row) => row.importWh, 'No import for this cycle'),
  amount('billed', 'Billed', (row) => row.billedCents),
  amount('ours', 'Ours', (row) => row.oursCents),
  {
    id: 'bank',
    head: 'Credit bank',
    unit: null,
    sortBy: (row) => row.bankCents ?? row.bankWh,
    cell: (row) =>
      row.bankCents !== null ? (
        <Money cents={row.bankCents} />
      ) : row.bankWh !== null ? (
        <span className="whitespace-nowrap">{kwh(row.bankWh)} kWh</span>
      ) : (
        <Missing reason="No credit bank on this plan" />
      ),
    sum: null,
    csv: (row) =>
      row.bankCents !== null ? dollarsText(row.bankCents) : row.bankWh !== null ? `${kwhText(row.bankWh)} kWh` : '',
  },
  amount('avoided', 'Bill avoided', (row) => row.avoidedCents),
  amount('incentive', 'Incentive', (row) => row.incentiveCents),
  amount('loan', 'Against the loan', (row) => row.loanCents),
  amount('added', 'Added', (row) => row.addedCents),
  {
    id: 'state',
    head: 'State',
    unit: null,
    sortBy: (row) => row.state,
    cell: (row) => <StateMark row={row} />,
    sum: null,
    csv: stateWords,
  },
];

/** Shown at first; the rest can be chosen. A phone starts with what fits a thumb's length. */
export const FIRST_COLUMNS = [
  'days',
  'made',
  'usedAtHome',
  'sentOut',
  'bought',
  'billed',
  'bank',
  'incentive',
  'loan',
  'added',
  'state',
];
export const FIRST_COLUMNS_PHONE = ['made', 'bought', 'billed', 'added', 'state'];

const MARKS: Record<CycleRow['state'], string> = {
  balanced: 'mark-ok',
  differs: 'mark-no',
  accepted: 'mark-wait',
  open: 'mark-wait',
};

function StateMark({ row }: { row: CycleRow }) {
  return (
    <span className={MARKS[row.state]} title={row.differs ?? undefined}>
      {stateWords(row)}
    </span>
  );
}
