import { useState } from 'react';
import type { Cycle } from '#shared/ledger/cycle.ts';
import type { Check } from '#shared/reconcile/check.ts';
import { parseDay } from '#shared/units/day.ts';
import { statedAndFound } from '#src/lib/check-words.ts';
import { fullDate } from '#src/lib/format.ts';
import type { HouseholdContext } from '#src/lib/household.ts';
import { errorWords } from '#src/lib/problem-words.ts';
import { Button } from '#src/ui/button.tsx';
import { Prose } from '#src/ui/prose.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { Verdict } from '#src/ui/verdict.tsx';
import { AcceptDialog } from './accept-dialog.tsx';
import { groupedChecks, pairWords, tellsMore } from './check-groups.ts';
import { useAccept } from './cycles-queries.ts';

/** Every check of the cycle by what it looks at: those that do not agree first, saying why and what to do; those that agree in one line each. */
export function ChecksSheet({ cycle, household }: { cycle: Cycle; household: HouseholdContext }) {
  const [accepting, setAccepting] = useState<Check | null>(null);
  return (
    <Sheet title="Checks">
      {groupedChecks(cycle.checks).map(({ title, open, agreeing }) => (
        <section key={title} className="mt-3 first:mt-1">
          <h3 className="flex items-baseline justify-between gap-4 border-b-2 border-ink pb-1">
            {title}
            <span className="hint font-normal">{agreeWords(agreeing.length, open)}</span>
          </h3>
          <ul>
            {open.map((check) => (
              <li key={check.key} className="border-b border-rule py-2">
                <p className="flex items-baseline justify-between gap-4">
                  <span>{check.title}</span>
                  <Verdict check={check} />
                </p>
                <Explained check={check} />
                {check.verdict === 'differs' && household.canEdit && check.accepted === null && (
                  <p className="no-print">
                    <button type="button" className="link min-h-11 text-[15px]" onClick={() => setAccepting(check)}>
                      Accept with a note
                    </button>
                  </p>
                )}
                {check.accepted && <Accepted check={check} cycle={cycle} household={household} />}
              </li>
            ))}
            {agreeing.map((check) => (
              <li key={check.key} className="flex items-baseline justify-between gap-4 py-0.5 text-[15px] text-soft">
                <span className="min-w-0">
                  {check.title}
                  {tellsMore(check) && <span className="hint block">{tellsMore(check)}</span>}
                </span>
                <Verdict check={check} />
              </li>
            ))}
          </ul>
        </section>
      ))}
      {accepting && (
        <AcceptDialog
          checks={[accepting]}
          householdId={household.id}
          cycleTo={cycle.to}
          onClose={() => setAccepting(null)}
        />
      )}
    </Sheet>
  );
}

/** "7 of 8 agree", of those that had something to compare; nothing where none had. */
function agreeWords(agreeing: number, open: readonly Check[]): string {
  const compared = agreeing + open.filter((check) => check.verdict === 'differs').length;
  return compared === 0 ? '' : `${agreeing} of ${compared} agree`;
}

function Explained({ check }: { check: Check }) {
  const { stated, found } = check;
  return (
    <div className="hint max-w-[60ch]">
      {check.verdict === 'differs' && stated !== null && found !== null && (
        <p>{statedAndFound(stated, found, check.unit, pairWords(check.check))}</p>
      )}
      {check.cause && (
        <p>
          <Prose text={check.cause} />
        </p>
      )}
      {check.advice && (
        <p className="text-ink">
          <Prose text={check.advice} />
        </p>
      )}
    </div>
  );
}

function Accepted({ check, cycle, household }: { check: Check; cycle: Cycle; household: HouseholdContext }) {
  const accept = useAccept(household.id, cycle.to);
  if (!check.accepted) return null;
  const day = parseDay(check.accepted.on.slice(0, 10));
  return (
    <div className="hint">
      <p>
        “{check.accepted.note}” {check.accepted.by}
        {day && `, ${fullDate(day)}`}
      </p>
      {household.canEdit && (
        <p className="no-print">
          <Button look="link" busy={accept.isPending} onClick={() => accept.mutate({ check: check.key, note: null })}>
            Take this back
          </Button>
        </p>
      )}
      {accept.isError && <p className="neg">{errorWords(accept.error)}</p>}
    </div>
  );
}
