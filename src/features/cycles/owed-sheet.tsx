import { Link } from 'react-router-dom';
import type { OwedList, OwedRow } from '#shared/ledger/owed-list.ts';
import { type Cents, cents } from '#shared/units/cents.ts';
import { cycleRangeWithYear, decimal, money } from '#src/lib/format.ts';
import { Sheet } from '#src/ui/sheet.tsx';
import { FigureButton } from '#src/ui/working.tsx';

/** What the utility owes the house or is owed, cycle by cycle with its causes and a running total; nothing when all bills agree. */
export function OwedSheet({ owed, base }: { owed: OwedList; base: string }) {
  if (owed.rows.length === 0) return null;
  return (
    <Sheet
      title="Between you and the utility"
      hint="What was billed too much and what the credit bank lacks, by cycle. Accepted differences are shown and left out of the total. Take it up with the utility; its tariff decides."
    >
      <div className="overflow-x-auto">
        <table className="ruled ruled-stack">
          <thead>
            <tr>
              <th scope="col">Cycle</th>
              <th scope="col" className="text">
                Why
              </th>
              <th scope="col">Owed to you</th>
              <th scope="col">Running</th>
            </tr>
          </thead>
          <tbody>
            {owed.rows.map((row) => (
              <OwedLine key={row.to} row={row} base={base} />
            ))}
            <tr className="total">
              <td>{wordsOf(owed.totalCents)}</td>
              <td className="text">{owed.totalKwh === '0' ? '' : `and ${decimal(owed.totalKwh)} kWh in the bank`}</td>
              <td data-label="Owed to you">
                <FigureButton title="Owed, in all" text={money(owed.totalCents)} working={owed.working} />
              </td>
              <td />
            </tr>
          </tbody>
        </table>
      </div>
    </Sheet>
  );
}

function OwedLine({ row, base }: { row: OwedRow; base: string }) {
  return (
    <tr>
      <th scope="row">
        <Link to={`${base}/cycles/${row.to}`}>{cycleRangeWithYear(row.from, row.to)}</Link>
      </th>
      <td className="text" data-label="Why">
        <span>
          {row.causes.join(' ')}
          {row.bankKwh !== null && ` The bank lacks ${decimal(row.bankKwh)} kWh.`}
          {row.accepted && <span className="hint"> Accepted with a note.</span>}
        </span>
      </td>
      <td data-label="Owed to you">
        <FigureButton
          title={`Owed, ${cycleRangeWithYear(row.from, row.to)}`}
          text={money(row.amountCents)}
          working={row.working}
          className={row.amountCents < 0 ? 'neg' : undefined}
        />
      </td>
      <td data-label="Running">{money(row.runningCents)}</td>
    </tr>
  );
}

function wordsOf(total: Cents): string {
  if (total === 0) return 'Nothing either way';
  return total > 0 ? 'The utility owes you' : `You owe the utility ${money(cents(-total))}`;
}
