import { useState } from 'react';
import type { Check } from '#shared/reconcile/check.ts';
import { errorWords } from '#src/lib/problem-words.ts';
import { Button } from '#src/ui/button.tsx';
import { Dialog } from '#src/ui/dialog.tsx';
import { ErrorSummary, TextArea } from '#src/ui/field.tsx';
import { Verdict } from '#src/ui/verdict.tsx';
import { useAccept } from './cycles-queries.ts';

/** Lets one or more differing checks stand, with a note that says why. */
export function AcceptDialog({
  checks,
  householdId,
  cycleTo,
  onClose,
}: {
  checks: readonly Check[];
  householdId: string;
  cycleTo: string;
  onClose: () => void;
}) {
  const accept = useAccept(householdId, cycleTo);
  // The list as it was when the dialog opened: accepting one would take it away under the hand.
  const [open] = useState(checks);
  const [left, setLeft] = useState<string[]>([]);
  const [note, setNote] = useState('');
  const [fault, setFault] = useState<string | null>(null);
  const chosen = open.filter((check) => !left.includes(check.key));
  const submit = async () => {
    const text = note.trim();
    if (text === '') return setFault('Say why, in a few words.');
    if (chosen.length === 0) return setFault('Choose what to accept.');
    setFault(null);
    try {
      for (const check of chosen) await accept.mutateAsync({ check: check.key, note: text });
      onClose();
    } catch {
      // What went wrong is shown from the mutation; the note stays as typed.
    }
  };
  return (
    <Dialog title="Accept with a note" onClose={onClose}>
      <p className="hint">The difference stays on record and stops asking for you. You can take this back.</p>
      <ErrorSummary errors={accept.isError ? [{ text: errorWords(accept.error) }] : []} title="Not accepted" />
      <form
        noValidate
        onSubmit={(event) => {
          event.preventDefault();
          void submit();
        }}
      >
        <ul className="mt-3 border-t border-rule">
          {open.map((check) => (
            <li key={check.key} className="border-b border-rule">
              <label className="flex min-h-11 items-center gap-3">
                <input
                  type="checkbox"
                  className="size-5 accent-accent"
                  checked={!left.includes(check.key)}
                  onChange={() =>
                    setLeft(left.includes(check.key) ? left.filter((key) => key !== check.key) : [...left, check.key])
                  }
                />
                <span className="grow">{check.title}</span>
                <Verdict check={check} />
              </label>
            </li>
          ))}
        </ul>
        <TextArea
          label="Note"
          hint="Why it may stand: what the utility said, when it will be put right."
          rows={3}
          maxLength={1000}
          value={note}
          error={fault ?? undefined}
          onChange={(event) => {
            setNote(event.target.value);
            if (fault) setFault(null);
          }}
        />
        <p className="mt-5">
          <Button type="submit" busy={accept.isPending}>
            Accept
          </Button>
        </p>
      </form>
    </Dialog>
  );
}
