import { useState } from 'react';
import { fullDate, money } from '#src/lib/format.ts';
import { Button } from '#src/ui/button.tsx';
import { Note } from '#src/ui/note.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { FactsList } from './facts-list.tsx';
import { LoanContractDialog } from './loan-contract-dialog.tsx';
import type { LoanProps } from './loan-props.ts';
import { DAY_COUNTS, mayBeLien, prepaymentWords, promotionWords, SECURITIES } from './loan-words.ts';
import { PaperLink } from './paper-link.tsx';

/** The contract beside its terms, and what may follow from how it is secured. */
export function LoanContract({ loan, householdId, canEdit }: LoanProps) {
  const [editing, setEditing] = useState(false);
  const { facts } = loan;
  const begin = loan.schedule.find((row) => row.number === 0 && row.segment === 0 && row.capitalisedCents > 0);
  return (
    <Sheet title="Your contract" actions={<PaperLink householdId={householdId} documentId={facts.documentId} />}>
      <FactsList
        rows={[
          { label: 'Interest is counted', value: DAY_COUNTS[facts.dayCount] },
          { label: 'Promotional period', value: promotionWords(facts) },
          { label: 'Prepayment', value: prepaymentWords(facts) },
          { label: 'Fee for a payoff', value: facts.payoffFeeCents === 0 ? 'none' : money(facts.payoffFeeCents) },
          { label: 'Secured', value: SECURITIES[facts.security] },
        ].map((row) => ({ ...row, value: <span className="whitespace-normal">{row.value}</span> }))}
      />
      {begin && (
        <p className="hint mt-3">
          Interest from the funding on {fullDate(facts.fundedOn)} to {fullDate(begin.on)},{' '}
          {money(begin.capitalisedCents)}, joined the principal. That is common practice, not known of this contract; a
          balance by the lender sets it right.
        </p>
      )}
      {mayBeLien(facts.security) && (
        <div className="mt-4">
          <Note title="It may count as a lien on the home.">
            {' '}
            The mortgage’s servicer may ask about it when insurance is to come off or the home is refinanced. Whether it
            counts is for the servicer, and for counsel.
          </Note>
        </div>
      )}
      {canEdit && (
        <p className="no-print mt-4">
          <Button look="plain" onClick={() => setEditing(true)}>
            Change the contract
          </Button>
        </p>
      )}
      {editing && <LoanContractDialog facts={facts} householdId={householdId} onClose={() => setEditing(false)} />}
    </Sheet>
  );
}
