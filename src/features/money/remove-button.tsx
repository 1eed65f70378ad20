import { useState } from 'react';
import { errorWords } from '#src/lib/problem-words.ts';
import { type MoneyChange, useMoneyChange } from './money-queries.ts';

/** Takes one recorded thing back, after asking once. */
export function RemoveButton({
  what,
  householdId,
  change,
}: {
  what: string;
  householdId: string;
  change: MoneyChange;
}) {
  const remove = useMoneyChange(householdId);
  const [asking, setAsking] = useState(false);
  if (!asking) {
    return (
      <button
        type="button"
        className="link no-print min-h-9 text-[15px] text-soft"
        aria-label={`Remove ${what}`}
        onClick={() => setAsking(true)}
      >
        Remove
      </button>
    );
  }
  return (
    <span className="no-print inline-flex flex-wrap items-center justify-end gap-x-3 text-[15px]">
      {remove.isError && <span className="neg">{errorWords(remove.error)}</span>}
      <button type="button" className="link min-h-9" disabled={remove.isPending} onClick={() => remove.mutate(change)}>
        Remove it
      </button>
      <button type="button" className="link min-h-9 text-soft" onClick={() => setAsking(false)}>
        Keep
      </button>
    </span>
  );
}
