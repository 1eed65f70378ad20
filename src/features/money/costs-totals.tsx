import type { CostsView } from '#shared/api/money-other.ts';
import { MoneyFigure } from '#src/ui/figure.tsx';
import { COST_KINDS } from './money-words.ts';

/** What each kind came to in each year, newest year first. */
export function CostsTotals({ view }: { view: CostsView }) {
  if (view.totals.length === 0) return null;
  const years = [...new Set(view.totals.map(({ year }) => year))].sort((a, b) => b - a);
  return (
    <details className="mt-5">
      <summary className="link inline-flex min-h-11 cursor-pointer items-center">Year by year, kind by kind</summary>
      {years.map((year) => (
        <section key={year} className="mt-2">
          <h3>{year}</h3>
          <ul className="border-t border-rule">
            {view.totals
              .filter((total) => total.year === year)
              .map(({ kind, amount }) => (
                <li key={kind} className="flex items-baseline justify-between gap-5 border-b border-rule py-2">
                  <span>{COST_KINDS[kind]}</span>
                  <MoneyFigure
                    title={`${COST_KINDS[kind]}, ${year}`}
                    cents={amount.amountCents}
                    working={amount.working}
                  />
                </li>
              ))}
          </ul>
        </section>
      ))}
    </details>
  );
}
