import { useState } from 'react';
import { errorWords } from '#src/lib/problem-words.ts';
import { type OtherChange, useOtherChange } from './other-queries.ts';

/** Takes one thing back, after asking once. */
export function OtherRemove({ what, householdId, change }: { what: string; householdId: string; change: OtherChange }) {
  const remove = useOtherChange(householdId);
  const [asking, setAsking] = useState(false);
  if (!asking) {
    return (
      <button
        type="button"
        className="link no-print min-h-11 text-[15px] text-soft sm:min-h-9"
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
      <button
        type="button"
        className="link min-h-11 sm:min-h-9"
        disabled={remove.isPending}
        onClick={() => remove.mutate(change)}
      >
        Remove it
      </button>
      <button type="button" className="link min-h-11 text-soft sm:min-h-9" onClick={() => setAsking(false)}>
        Keep
      </button>
    </span>
  );
}
