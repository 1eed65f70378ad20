import { type ReactNode, useState } from 'react';
import { errorWords } from '#src/lib/problem-words.ts';
import { type LoanChange, useLoanChange } from './loan-queries.ts';

/** Ruled lines of what was entered; `empty` says that nothing was. */
export function LoanList({ empty, children }: { empty: string; children: ReactNode[] }) {
  return (
    <ul className="mt-1 border-t-2 border-ink">
      {children}
      {children.length === 0 && <li className="border-b border-rule py-2 text-soft">{empty}</li>}
    </ul>
  );
}

/** One entered thing with its amount, and how it is taken back. */
export function LoanLine({ amount, remove, children }: { amount: ReactNode; remove: ReactNode; children: ReactNode }) {
  return (
    <li className="flex flex-wrap items-baseline justify-between gap-x-5 border-b border-rule py-2">
      <span className="min-w-0">{children}</span>
      <span className="ml-auto flex items-baseline gap-4">
        {remove}
        <span className="min-w-24 text-right">{amount}</span>
      </span>
    </li>
  );
}

/** Takes one thing back, after asking once. */
export function LoanRemove({ what, householdId, change }: { what: string; householdId: string; change: LoanChange }) {
  const remove = useLoanChange(householdId);
  const [asking, setAsking] = useState(false);
  const look = 'link no-print min-h-11 text-[15px] sm:min-h-9';
  if (!asking) {
    return (
      <button
        type="button"
        className={`${look} text-soft`}
        aria-label={`Remove ${what}`}
        onClick={() => setAsking(true)}
      >
        Remove
      </button>
    );
  }
  return (
    <span className="inline-flex flex-wrap items-center justify-end gap-x-3">
      {remove.isError && (
        <span role="alert" className="neg">
          {errorWords(remove.error)}
        </span>
      )}
      <button type="button" className={look} disabled={remove.isPending} onClick={() => remove.mutate(change)}>
        Remove it
      </button>
      <button type="button" className={`${look} text-soft`} onClick={() => setAsking(false)}>
        Keep
      </button>
    </span>
  );
}
