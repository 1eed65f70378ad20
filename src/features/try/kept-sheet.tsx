import { useState } from 'react';
import type { Scenario } from '#shared/facts/scenario.ts';
import { fullDate } from '#src/lib/format.ts';
import { errorWords } from '#src/lib/problem-words.ts';
import { Button } from '#src/ui/button.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { MOST_BESIDE } from './beside.ts';
import { KeepDialog } from './keep-dialog.tsx';
import { useRemove } from './try-queries.ts';
import type { Shown } from './use-try.ts';

/** Changes kept by name: opened again, set beside each other, removed. */
export function KeptSheet({
  householdId,
  canEdit,
  scenarios,
  shown,
  isPulled,
  openedId,
  besideIds,
  besideCount,
  failed,
  onOpen,
  onBeside,
}: {
  householdId: string;
  canEdit: boolean;
  scenarios: readonly Scenario[];
  shown: Shown | null;
  /** Whether there is a change on the page to be kept. */
  isPulled: boolean;
  openedId: string | null;
  besideIds: readonly string[];
  /** Columns that stand side by side now. */
  besideCount: number;
  failed: readonly { id: string; name: string; why: string }[];
  onOpen: (id: string, scenario: Scenario | null) => void;
  onBeside: (ids: string[]) => void;
}) {
  const [keeping, setKeeping] = useState(false);
  const opened = scenarios.find((one) => one.id === openedId) ?? null;
  return (
    <Sheet
      title="Kept changes"
      hint={`Up to ${MOST_BESIDE} changes stand side by side, the one being tried among them. Keeping one changes nothing of the record.`}
      actions={
        canEdit &&
        isPulled && (
          <Button look="plain" onClick={() => setKeeping(true)}>
            Keep this change
          </Button>
        )
      }
    >
      {scenarios.length === 0 && (
        <p className="text-soft">
          {canEdit ? 'None yet. Pull a lever, then keep the change under a name.' : 'None. An owner can keep a change.'}
        </p>
      )}
      {scenarios.length > 0 && (
        <ul className="border-t border-rule">
          {scenarios.map((one) => {
            const isBeside = besideIds.includes(one.id);
            const why = failed.find(({ id }) => id === one.id)?.why;
            return (
              <li key={one.id} className="border-b border-rule py-1">
                <div className="flex flex-wrap items-center justify-between gap-x-6">
                  <span className="min-w-0">
                    {one.name}
                    <span className="hint"> kept {fullDate(one.createdOn)}</span>
                    {one.id === openedId && <span className="hint">, open</span>}
                  </span>
                  <span className="no-print flex flex-wrap items-center gap-x-5 text-[15px]">
                    <label className="flex min-h-11 items-center gap-2">
                      <input
                        type="checkbox"
                        className="size-5 accent-accent"
                        checked={isBeside}
                        disabled={!isBeside && besideCount >= MOST_BESIDE}
                        onChange={() =>
                          onBeside(isBeside ? besideIds.filter((id) => id !== one.id) : [...besideIds, one.id])
                        }
                      />
                      Compare<span className="visually-hidden"> {one.name}</span>
                    </label>
                    <button type="button" className="link min-h-11" onClick={() => onOpen(one.id, one)}>
                      Open<span className="visually-hidden"> {one.name}</span>
                    </button>
                    {canEdit && <RemoveKept householdId={householdId} scenario={one} />}
                  </span>
                </div>
                {isBeside && why !== undefined && <p className="field-error pb-2">It cannot be compared: {why}</p>}
              </li>
            );
          })}
        </ul>
      )}
      {keeping && shown && (
        <KeepDialog
          householdId={householdId}
          levers={shown.levers}
          scenarios={scenarios}
          opened={opened}
          onKept={(id) => onOpen(id, null)}
          onClose={() => setKeeping(false)}
        />
      )}
    </Sheet>
  );
}

/** Removes a kept change, after asking once. */
function RemoveKept({ householdId, scenario }: { householdId: string; scenario: Scenario }) {
  const remove = useRemove(householdId);
  const [asking, setAsking] = useState(false);
  if (!asking) {
    return (
      <button
        type="button"
        className="link min-h-11 text-soft"
        aria-label={`Remove ${scenario.name}`}
        onClick={() => setAsking(true)}
      >
        Remove
      </button>
    );
  }
  return (
    <>
      {remove.isError && <span className="neg">{errorWords(remove.error)}</span>}
      <button
        type="button"
        className="link min-h-11"
        disabled={remove.isPending}
        onClick={() => remove.mutate(scenario.id)}
      >
        Remove it
      </button>
      <button type="button" className="link min-h-11 text-soft" onClick={() => setAsking(false)}>
        Keep it
      </button>
    </>
  );
}
