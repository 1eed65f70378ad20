import { useState } from 'react';
import type { MortgageView } from '#shared/api/money-mortgage.ts';
import { money } from '#src/lib/format.ts';
import { FigureButton } from '#src/ui/working.tsx';
import type { InsuranceProps } from './insurance-props.ts';
import { InsuranceRecordDialog } from './insurance-record-dialog.tsx';

const STATES = { met: 'met', notMet: 'not met', notStated: 'not stated' } as const;
const MARKS = { met: 'mark-ok', notMet: 'mark-no', notStated: 'mark-wait' } as const;

/** What an investor's servicing guide would ask to take the insurance off on the home's value of today. */
export function InsuranceAsks({ view }: { view: MortgageView }) {
  const { currentValue } = view;
  return (
    <div className="min-w-0">
      <h3>On the home’s value of today</h3>
      <p className="hint">
        The law goes by the original value. An investor’s servicing guide may allow it on a new one; guides change, so
        ask the servicer which rule holds for this loan.
      </p>
      <ul className="mt-2 border-t-2 border-ink">
        {currentValue.conditions.map((one) => (
          <li key={one.id} className="flex items-baseline justify-between gap-x-5 border-b border-rule py-2">
            <span>
              {one.label}
              <span className="hint block">
                {one.words}.{one.next && ` ${one.next}.`}
              </span>
              {one.id === 'ratio' && currentValue.most && (
                <span className="block text-[15px]">
                  At most{' '}
                  <FigureButton
                    title="The most the balance may be on the value of today"
                    text={money(currentValue.most.amountCents)}
                    working={currentValue.most.working}
                  />
                </span>
              )}
            </span>
            <span className={`whitespace-nowrap ${MARKS[one.state]}`}>{STATES[one.state]}</span>
          </li>
        ))}
      </ul>
      <p className="mt-2">{outcome(view)}</p>
    </div>
  );
}

function outcome({ currentValue, facts }: MortgageView): string {
  if (facts.insurance?.removedOn) return 'For the record: the insurance is gone already.';
  switch (currentValue.state) {
    case 'met':
      return 'By what is entered, all of it is met. The servicer decides.';
    case 'notMet':
      return 'By what is entered, it would be refused today.';
    case 'notStated':
      return 'Not everything it asks is entered yet.';
  }
}

const READY = { ready: 'ready', open: 'to do', trouble: 'in the way' } as const;
const READY_MARKS = { ready: 'mark-ok', open: 'mark-wait', trouble: 'mark-no' } as const;

/** The checklist toward asking for the removal: what is known and what to do next. */
export function InsuranceChecklist({ view, householdId, canEdit }: InsuranceProps) {
  const [editing, setEditing] = useState(false);
  return (
    <>
      <ul className="border-t border-rule">
        {view.checklist.map((line) => (
          <li key={line.id} className="flex items-baseline justify-between gap-x-5 border-b border-rule py-2">
            <span>
              {line.label}
              <span className="hint block">
                {line.known}.{line.next && ` ${line.next}.`}
              </span>
            </span>
            <span className={`whitespace-nowrap ${READY_MARKS[line.state]}`}>{READY[line.state]}</span>
          </li>
        ))}
      </ul>
      {canEdit && (
        <p className="no-print mt-2">
          <button type="button" className="link min-h-11 sm:min-h-9" onClick={() => setEditing(true)}>
            Say how payments, liens and the request stand
          </button>
        </p>
      )}
      {editing && (
        <InsuranceRecordDialog facts={view.facts} householdId={householdId} onClose={() => setEditing(false)} />
      )}
    </>
  );
}
