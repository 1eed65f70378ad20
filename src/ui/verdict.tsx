import type { Check } from '#shared/reconcile/check.ts';
import { decimal } from '#src/lib/format.ts';

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

function amountOf(check: Check): string {
  if (check.difference === null) return 'differs';
  const size = check.difference.replace('-', '');
  const text = decimal(check.unit === 'kWh' ? shortKwh(size) : size);
  switch (check.unit) {
    case 'USD':
      return `$${text}`;
    case 'kWh':
      return `${text} kWh`;
    case 'days':
      return `${text} days`;
    case 'percent':
      return `${text}%`;
    default:
      return 'differs';
  }
}

/** Whole kWh from ten on: a verdict names the size, the check itself has the exact figures. */
function shortKwh(size: string): string {
  return Number(size) >= 10 ? String(Math.round(Number(size))) : size;
}
