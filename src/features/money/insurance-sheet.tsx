import type { MoneyView } from '#shared/api/money.ts';
import { fullDate, money } from '#src/lib/format.ts';
import { Missing } from '#src/ui/money.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { FactsList } from './facts-list.tsx';
import { END_RULES, insuranceStanding } from './money-words.ts';

/** Mortgage insurance: what the roof avoided, and the days on which it could have gone anyway. */
export function InsuranceSheet({ insurance }: { insurance: NonNullable<MoneyView['insurance']> }) {
  const paid = insurance.facts.insurance;
  return (
    <Sheet title="Mortgage insurance" hint={insuranceStanding(insurance)}>
      {paid && (
        <>
          <FactsList
            rows={[
              { label: 'Premium', value: money(paid.premiumMonthlyCents), hint: 'each month' },
              { label: 'Avoided so far', value: money(insurance.avoidedCents) },
            ]}
          />
          <h3 className="mt-6">When it could have gone without the roof</h3>
          <ul className="mt-1 border-t border-rule">
            {insurance.ends.map((end) => {
              const governs = end.rule === insurance.governs;
              return (
                <li key={end.rule} className="flex items-baseline justify-between gap-x-5 border-b border-rule py-2">
                  <span className={governs ? 'font-semibold' : undefined}>
                    {capital(END_RULES[end.rule])}
                    <span className="hint block font-normal">
                      {end.words}
                      {governs && '. This is the day that counts'}.
                    </span>
                  </span>
                  <span className={governs ? 'whitespace-nowrap font-semibold' : 'whitespace-nowrap'}>
                    {end.on ? fullDate(end.on) : <Missing reason="Never, or not known" />}
                  </span>
                </li>
              );
            })}
          </ul>
          <p className="hint mt-2">Ask the servicer before relying on a day; its records decide.</p>
        </>
      )}
    </Sheet>
  );
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
