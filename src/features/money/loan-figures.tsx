import type { LoanView } from '#shared/api/money-loan.ts';
import { fullDate, money } from '#src/lib/format.ts';
import { percentWords } from '#src/lib/typed-values.ts';
import { MoneyFigure } from '#src/ui/figure.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { FigureButton } from '#src/ui/working.tsx';
import { FactsList, type FactsRow } from './facts-list.tsx';
import type { LoanProps } from './loan-props.ts';
import { aprWords, LEVEL_REASONS } from './loan-words.ts';

/** What the loan costs: payment by payment level, interest, the dealer fee and the rate it makes. */
export function LoanFigures({ loan }: LoanProps) {
  const { facts, aprWithFee, apr } = loan;
  const rows: FactsRow[] = [
    ...loan.levels.map((level) => ({
      label: `Level payment, ${LEVEL_REASONS[level.reason]}`,
      hint: `from payment ${level.fromNumber}${level.segment > 0 ? ' of the new loan' : ''}`,
      value: (
        <MoneyFigure
          title={`Level payment, ${LEVEL_REASONS[level.reason]}`}
          cents={level.amountCents}
          working={level.working}
        />
      ),
    })),
    {
      label: 'Interest, the whole schedule',
      hint: 'what joined the principal included',
      value: (
        <MoneyFigure
          title="Interest, the whole schedule"
          cents={loan.interest.amountCents}
          working={loan.interest.working}
        />
      ),
    },
    { label: <span className="pl-5">interest so far</span>, value: money(loan.interestPaidCents) },
    {
      label: 'Cash so far',
      value: <MoneyFigure title="Cash so far, the loan" cents={loan.paid.amountCents} working={loan.paid.working} />,
    },
    ...feeRows(loan),
    ...(apr === null
      ? []
      : [
          {
            label: 'Effective rate a year, as contracted',
            hint: 'by the equation of Regulation Z, nothing prepaid',
            value: <AprFigure title="Effective rate a year, as contracted" apr={apr} />,
          },
        ]),
    ...(aprWithFee === null
      ? []
      : [
          {
            label: 'Effective rate a year, with the dealer fee',
            hint: 'the fee taken for a finance charge; the lender’s own disclosure may not count it',
            value: <AprFigure title="Effective rate a year, with the dealer fee" apr={aprWithFee} />,
          },
        ]),
    ...(loan.clearedOn ? [{ label: 'Last payment', value: fullDate(loan.clearedOn) }] : []),
  ];
  return (
    <Sheet
      title="What it costs"
      hint={`${facts.lender === '' ? 'The lender' : facts.lender}, ${percentWords(facts.annualRate)} over ${facts.termMonths} months, funded ${fullDate(facts.fundedOn)}.`}
    >
      <FactsList rows={[{ label: 'Principal', value: money(facts.principalCents) }, ...rows]} />
    </Sheet>
  );
}

function feeRows({ facts }: LoanView): FactsRow[] {
  if (facts.dealerFeeCents === 0) return [];
  return [
    {
      label: 'Dealer fee inside the principal',
      hint: 'Part of the loan, not a cost of its own, and no part of the tax credit.',
      value: money(facts.dealerFeeCents),
    },
  ];
}

function AprFigure({ title, apr }: { title: string; apr: NonNullable<LoanView['apr']> }) {
  return <FigureButton title={title} text={aprWords(apr.apr)} working={apr.proof.working} />;
}
