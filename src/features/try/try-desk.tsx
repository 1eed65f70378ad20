import { useDeferredValue, useMemo } from 'react';
import { Link } from 'react-router-dom';
import type { Scenario } from '#shared/facts/scenario.ts';
import type { Outcome } from '#shared/try/outcome.ts';
import { differenceSentence } from '#shared/try/sentence.ts';
import type { TryBasis } from '#shared/try/try-levers.ts';
import { monthName } from '#src/lib/format.ts';
import type { HouseholdContext } from '#src/lib/household.ts';
import { Prose } from '#src/ui/prose.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { sideBySide, workedOut } from './beside.ts';
import { ChangesSheet } from './changes-sheet.tsx';
import { sameLevers } from './draft.ts';
import { HouseLevers } from './house-levers.tsx';
import { KeptSheet } from './kept-sheet.tsx';
import { textsOf } from './lever-texts.ts';
import { LinesSheet } from './lines-sheet.tsx';
import { LoanLevers } from './loan-levers.tsx';
import { PriceLevers } from './price-levers.tsx';
import { saidParts } from './said-parts.ts';
import { tryLines } from './try-lines.ts';
import { NO_LEVERS, type Tryout, useTry } from './use-try.ts';

/** Levers at the left, what they come to at the right, the difference in a sentence above both. */
export function TryDesk({
  household,
  tryBasis,
  scenarios,
}: {
  household: HouseholdContext;
  tryBasis: TryBasis;
  scenarios: readonly Scenario[];
}) {
  const tryout = useTry(household.id, tryBasis);
  const { draft, put, shown } = tryout;
  const base = tryout.base.ok ? tryout.base.outcome : null;
  const kept = useMemo(() => workedOut(tryBasis, scenarios, draft.besideIds), [tryBasis, scenarios, draft.besideIds]);
  const opened = scenarios.find((one) => one.id === draft.openedId) ?? null;
  const beside = useMemo(() => sideBySide(shown, opened, kept.beside), [shown, opened, kept.beside]);
  // The sentence follows every input at once; the drawing may lag behind a slider that is still moving.
  const drawn = useDeferredValue(beside);
  const lines = useMemo(() => (base ? tryLines(base, drawn) : []), [base, drawn]);
  const { plans, assumptions } = tryBasis.basis.facts;
  if (base === null) return <p className="page lede">{tryout.base.ok ? '' : tryout.base.why}</p>;
  const isPulled = shown !== null && !sameLevers(shown.levers, NO_LEVERS);
  const open = (id: string, scenario: Scenario | null) =>
    put(scenario ? { openedId: id, texts: textsOf(scenario.levers, plans, tryout.rest) } : { openedId: id });
  const assumed = [...new Set(beside.flatMap((one) => one.assumed))];
  return (
    <div className="page">
      <p className="no-print hint">
        <Link to={`/h/${household.id}/money`} className="inline-flex min-h-11 items-center sm:min-h-0">
          Money
        </Link>
        <span aria-hidden="true"> › </span>Try a change
      </p>
      <div className="try-head" aria-live="polite">
        <Sentence title="Try a change">
          <Headline tryout={tryout} base={base} />
        </Sentence>
        {tryout.faults.length > 0 && (
          <p className="hint mt-1">
            {tryout.faults.every((fault) => fault.path === '')
              ? tryout.faults[0]?.message
              : 'Not everything set below can be used yet; the figures are from what was set before.'}
          </p>
        )}
      </div>
      <p className="lede">
        {isPulled
          ? 'A projection, and so an estimate. The record is not touched.'
          : 'Pull a lever to see what it would change. The record is not touched by it.'}
      </p>
      <div className="grid items-start gap-x-[26px] lg:grid-cols-[minmax(0,400px)_minmax(0,1fr)]">
        <Sheet
          title="Levers"
          actions={
            <button type="button" className="link min-h-11 sm:min-h-0" onClick={tryout.resetAll}>
              Reset all
            </button>
          }
        >
          <h3 className="mt-3 border-b-2 border-ink pb-1">The loan</h3>
          <LoanLevers tryout={tryout} basis={tryBasis.basis} payoffCents={-(base.months[0]?.loanPayoffCents ?? 0)} />
          <h3 className="mt-7 border-b-2 border-ink pb-1">The utility</h3>
          <PriceLevers tryout={tryout} plans={plans} />
          <h3 className="mt-7 border-b-2 border-ink pb-1">The house</h3>
          <HouseLevers tryout={tryout} />
        </Sheet>
        <div className="min-w-0">
          <LinesSheet lines={lines} />
          <ChangesSheet base={base} beside={drawn} years={Math.round(assumptions.horizonMonths / 12)} />
          {assumed.length > 0 && (
            <Sheet title="What is assumed">
              <ul>
                {assumed.map((one) => (
                  <li key={one} className="border-b border-rule py-2">
                    {one}
                  </li>
                ))}
              </ul>
              <p className="hint mt-2">
                Everything else is as on the <Link to={`/h/${household.id}`}>Position</Link> screen, under Assumptions.
              </p>
            </Sheet>
          )}
          <KeptSheet
            householdId={household.id}
            canEdit={household.canEdit}
            scenarios={scenarios}
            shown={shown}
            isPulled={isPulled}
            openedId={draft.openedId}
            besideIds={draft.besideIds}
            besideCount={beside.length}
            failed={kept.failed}
            onOpen={open}
            onBeside={(besideIds) => put({ besideIds })}
          />
        </div>
      </div>
      <p className="foot">
        Nothing here is lending or tax advice; ask the servicer whether it re-amortizes, and your preparer about the
        credit.
      </p>
    </div>
  );
}

function Headline({ tryout, base }: { tryout: Tryout; base: Outcome }) {
  const { shown } = tryout;
  const said = shown && differenceSentence(shown.levers, base, shown.outcome);
  if (shown && said) {
    const { what, first, rest } = saidParts(said, shown.levers);
    return (
      <>
        <Prose text={what} /> <b>{first}</b>
        <Prose text={rest} />
      </>
    );
  }
  return base.evenOn === null ? (
    <>As things stand the roof is not even within the years projected.</>
  ) : (
    <>
      As things stand the roof is even in <b>{`${monthName(base.evenOn)} ${base.evenOn.slice(0, 4)}`}</b>.
    </>
  );
}
