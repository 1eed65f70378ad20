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
import { useAccept } from './cycles-queries.ts';

/** Every check of the cycle with its outcome; those that differ say why, and what to do. */
export function ChecksSheet({ cycle, household }: { cycle: Cycle; household: HouseholdContext }) {
  const [accepting, setAccepting] = useState<Check | null>(null);
  return (
    <Sheet title="Checks">
      <ul className="mt-2 border-t-2 border-ink">
        {cycle.checks.map((check) => (
          <li key={check.key} className="border-b border-rule py-2">
            <p className="flex items-baseline justify-between gap-4">
              <span>{check.title}</span>
              <Verdict check={check} />
            </p>
            {check.verdict !== 'agrees' && <Explained check={check} />}
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
      </ul>
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

function Explained({ check }: { check: Check }) {
  const { stated, found } = check;
  return (
    <div className="hint max-w-[60ch]">
      {check.verdict === 'differs' && stated !== null && found !== null && (
        <p>{statedAndFound(stated, found, check.unit)}</p>
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
