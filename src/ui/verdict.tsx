import type { Check } from '#shared/reconcile/check.ts';
import { checkValue } from '#src/lib/check-words.ts';

/** A check's outcome in words: "agrees", the difference with its unit, "accepted", or "nothing to compare". */
export function Verdict({ check }: { check: Check }) {
  switch (check.verdict) {
    case 'agrees':
      return <span className="mark-ok">agrees</span>;
    case 'nothing-to-compare':
      return <span className="mark-wait">nothing to compare</span>;
    case 'differs':
      return check.accepted ? (
        <span className="mark-wait">accepted, {amountOf(check)}</span>
      ) : (
        <span className="mark-no">{amountOf(check)}</span>
      );
  }
}

/** The size of the difference; the check itself has the exact figures. */
function amountOf({ difference, unit }: Check): string {
  if (difference === null || unit === 'date' || unit === 'text') return 'differs';
  return checkValue(difference.replace('-', ''), unit);
}
