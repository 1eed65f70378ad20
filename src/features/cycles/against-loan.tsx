import type { ReactNode } from 'react';
import type { Cycle, WithoutRoofMethod } from '#shared/ledger/cycle.ts';
import { MoneyFigure } from '#src/ui/figure.tsx';
import { Money } from '#src/ui/money.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { addedWorking, cycleMoney } from './cycle-money.ts';

const METHODS: Record<WithoutRoofMethod, string> = {
  measured: 'The use of this cycle, priced on the plan the house would have without a roof.',
  sameMonthBefore: 'An estimate: the use of the same month before the roof, priced as it would be now.',
  yearlyMeanBefore: 'An estimate: the mean use of the year before the roof, priced as it would be now.',
};

/** "Against the loan": what the cycle kept or earned, less what it paid, line by line. */
export function AgainstLoan({ cycle }: { cycle: Cycle }) {
  const { lines, earned } = cycleMoney(cycle);
  const { withoutRoof } = cycle;
  return (
    <Sheet title="Against the loan">
      <table className="ruled">
        <thead>
          <tr>
            <td />
            <th scope="col">This cycle</th>
          </tr>
        </thead>
        <tbody>
          {lines.map((line) => (
            <Row key={line.key} label={line.label} hint={line.estimated ? 'An estimate.' : null}>
              <MoneyFigure title={line.title} cents={line.cents} working={line.working} />
            </Row>
          ))}
          {cycle.loanPayments === 0 && (
            <Row label="Loan payment" hint={null}>
              <span className="text-soft">none fell in this cycle</span>
            </Row>
          )}
          <tr className="total">
            <th scope="row">Added to the position</th>
            <td>
              <MoneyFigure title="Added to the position" cents={cycle.addedCents} working={addedWorking(cycle)} />
            </td>
          </tr>
        </tbody>
      </table>
      <div className="hint mt-2">
        {withoutRoof && <p>{METHODS[withoutRoof.method]}</p>}
        {!withoutRoof && <p>What the bill would have been without the roof is not known for this cycle.</p>}
        {cycle.loanPayments > 1 && <p>{cycle.loanPayments} loan payments fell in this cycle.</p>}
        {earned.map((entry) => (
          <p key={entry.id}>
            {entry.label}: <Money cents={entry.amountCents} />. It counts on the day it is paid.
          </p>
        ))}
      </div>
    </Sheet>
  );
}

function Row({ label, hint, children }: { label: ReactNode; hint: string | null; children: ReactNode }) {
  return (
    <tr>
      <th scope="row">
        {label}
        {hint && <span className="hint"> {hint}</span>}
      </th>
      <td>{children}</td>
    </tr>
  );
}
