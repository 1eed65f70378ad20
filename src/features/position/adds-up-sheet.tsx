import { type ReactNode, useId, useState } from 'react';
import type { Position } from '#shared/position/position.ts';
import { BOOK_NAMES, BookKey } from '#src/ui/book-key.tsx';
import { MoneyFigure } from '#src/ui/figure.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { usePhone } from '#src/ui/use-media.ts';
import { addsUp, booksShown, type Cell, type Column } from './adds-up.ts';

type Line = {
  key: string;
  label: ReactNode;
  name: string;
  of: (column: Column) => Cell;
  total?: boolean;
  soft?: boolean;
};

/** "How it adds up": every book over four spans of time, down to settled today. Each figure opens its working. */
export function AddsUpSheet({ position }: { position: Position }) {
  const phone = usePhone();
  const columns = addsUp(position);
  const [chosen, setChosen] = useState<Column['key']>('all');
  const pickerId = useId();
  const lines = linesOf(columns);
  const shown = phone ? columns.filter((column) => column.key === chosen) : columns;
  return (
    <Sheet
      title="How it adds up"
      hint="Open any figure to see the lines and documents under it."
      actions={
        phone && (
          <select
            id={pickerId}
            aria-label="Over which time"
            className="min-h-11 border-0 bg-transparent text-[15px] underline underline-offset-3"
            value={chosen}
            onChange={(event) => setChosen(event.target.value as Column['key'])}
          >
            {columns.map((column) => (
              <option key={column.key} value={column.key}>
                {column.head}
              </option>
            ))}
          </select>
        )
      }
    >
      <table className="ruled">
        <thead className={phone ? 'visually-hidden' : undefined}>
          <tr>
            <td />
            {shown.map((column) => (
              <th key={column.key} scope="col">
                {column.head}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {lines
            .filter((line) => shown.some((column) => line.of(column) !== null))
            .map((line) => (
              <tr key={line.key} className={line.total ? 'total' : undefined}>
                <th scope="row" className={line.soft ? 'text-soft!' : undefined}>
                  {line.label}
                </th>
                {shown.map((column) => (
                  <td key={column.key}>
                    <CellFigure cell={line.of(column)} title={`${line.name}, ${column.head.toLowerCase()}`} />
                  </td>
                ))}
              </tr>
            ))}
        </tbody>
      </table>
    </Sheet>
  );
}

function CellFigure({ cell, title }: { cell: Cell; title: string }) {
  return cell && <MoneyFigure title={title} cents={cell.cents} working={cell.working} quietZero />;
}

function linesOf(columns: Column[]): Line[] {
  const line = (key: string, name: string, of: Line['of'], more: Partial<Line> = {}): Line => ({
    key,
    name,
    label: name,
    of,
    ...more,
  });
  const anything = (of: Line['of']) => columns.some((column) => (of(column)?.cents ?? 0) !== 0);
  const owed: Line[] = [
    line('creditToCome', 'Tax credit still to come', (column) => column.creditToCome),
    line('incentiveOwed', 'Incentive owed', (column) => column.incentiveOwed),
    line('bank', 'Utility bank', (column) => column.bank),
  ].filter((one) => anything(one.of));
  return [
    ...booksShown(columns).map((book) =>
      line(book, BOOK_NAMES[book], (column) => column.books[book], {
        label: (
          <span className="flex items-baseline">
            <BookKey book={book} />
            <span>{BOOK_NAMES[book]}</span>
          </span>
        ),
      }),
    ),
    line('cash', 'Cash so far', (column) => column.cash, { total: true }),
    line('payoff', 'Loan still owed', (column) => column.loan),
    ...owed,
    line('settled', 'Settled today', (column) => column.settled, { total: true }),
    line('withoutCredit', 'Without the credit still to come', (column) => column.withoutCredit, { soft: true }),
  ].filter((one) => one.key !== 'withoutCredit' || anything((column) => column.creditToCome));
}
