import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { type CreditView, creditApi } from '#shared/api/credit.ts';
import { addressOf } from '#src/lib/api.ts';
import { dollars } from '#src/lib/format.ts';
import { type HouseholdContext, useHousehold } from '#src/lib/household.ts';
import { Button, ButtonLink } from '#src/ui/button.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { EmptyState, ErrorState, PageSkeleton } from '#src/ui/states.tsx';
import { usePhone } from '#src/ui/use-media.ts';
import { CostSheet } from './cost-sheet.tsx';
import { CreditBars } from './credit-bars.tsx';
import { creditQuery } from './credit-queries.ts';
import { creditLede } from './credit-words.ts';
import { FormBlocks, FormTable } from './form-table.tsx';
import { Papers } from './papers.tsx';
import { YearDialog } from './year-dialog.tsx';

/** Tax credit: how it goes through the returns, and the papers behind it. A preparer sees exactly this, to read. */
export function CreditPage() {
  const household = useHousehold();
  const view = useQuery(creditQuery(household.id));
  if (view.isPending) return <PageSkeleton />;
  if (view.isError) return <ErrorState error={view.error} retry={() => view.refetch()} />;
  return view.data.credit === null ? (
    <FirstUse household={household} />
  ) : (
    <Credit view={view.data} household={household} />
  );
}

function Credit({ view, household }: { view: CreditView; household: HouseholdContext }) {
  const [editing, setEditing] = useState<number | 'new' | null>(null);
  const phone = usePhone();
  const change = household.canEdit ? setEditing : null;
  const years = view.credit?.years ?? [];
  const lastYear = view.lines.at(-1)?.taxYear;
  const notes = view.forms.flatMap((form) => (form.note ? [`${form.taxYear}: ${form.note}`] : []));
  const carry = view.stillToCarryCents;
  return (
    <div className="page">
      <Sentence title="Tax credit" lede={creditLede(view)}>
        {view.usedCents > 0 ? <b className="pos">{dollars(view.usedCents)} used</b> : <b>None used yet</b>}
        {carry > 0
          ? `, ${dollars(carry)} still to carry.`
          : carry === 0 && view.usedCents > 0
            ? ', nothing left to carry.'
            : '.'}
      </Sentence>
      <Sheet
        title="Form 5695, Part I, year by year"
        hint="Line numbers are each year’s own. The limit comes from your return; we never guess it."
        actions={
          <a
            className="no-print underline underline-offset-3"
            href={addressOf(creditApi.summaryCsv, { householdId: household.id })}
            download
          >
            Summary for the preparer, CSV
          </a>
        }
      >
        {phone ? <FormBlocks view={view} change={change} /> : <FormTable view={view} change={change} />}
        <CreditBars view={view} />
        {household.canEdit && (
          <p className="no-print mt-5">
            <Button look="plain" onClick={() => setEditing('new')}>
              Add a tax year
            </Button>
          </p>
        )}
        {notes.map((note) => (
          <p key={note} className="hint mt-2">
            {note}
          </p>
        ))}
      </Sheet>
      <div className="grid gap-x-[26px] lg:grid-cols-2">
        <CostSheet view={view} />
        <Papers view={view} householdId={household.id} canEdit={household.canEdit} />
      </div>
      <Checks view={view} />
      <p className="foot">
        This repeats figures {household.canEdit ? 'you' : 'the owner'} entered and the arithmetic printed on the form.
        It is not tax advice and does not decide whether you qualify. Carryforward shown is unused, not guaranteed.
        Check every figure against the form and instructions of its year, or ask a tax professional, before filing.
      </p>
      {editing !== null && (
        <YearDialog
          year={editing === 'new' ? null : (years.find((year) => year.taxYear === editing) ?? blankYear(editing))}
          suggested={(lastYear ?? new Date().getFullYear() - 1) + (lastYear ? 1 : 0)}
          householdId={household.id}
          onClose={() => setEditing(null)}
        />
      )}
    </div>
  );
}

/** A year the form shows because the cost entered then, before the owner entered anything about its return. */
function blankYear(taxYear: number) {
  return {
    taxYear,
    limitCents: null,
    status: 'planned' as const,
    filedOn: null,
    refundOn: null,
    asRefund: true,
    typedBy: null,
    limitFrom: null,
    documentId: null,
  };
}

function Checks({ view }: { view: CreditView }) {
  if (view.checks.length === 0) return null;
  return (
    <Sheet title="Checks">
      <ul className="mt-2 border-t-2 border-ink">
        {view.checks.map((check) => (
          <li key={check.label} className="flex flex-wrap items-baseline gap-x-5 border-b border-rule py-2">
            <span className="grow">{check.label}</span>
            <span className="hint">{check.detail}</span>
            <CheckMark agrees={check.agrees} />
          </li>
        ))}
      </ul>
    </Sheet>
  );
}

function FirstUse({ household }: { household: HouseholdContext }) {
  return (
    <div className="page">
      <Sentence title="Tax credit">
        <b>No tax credit is entered.</b>
      </Sentence>
      <EmptyState
        title="What will stand here"
        action={household.canEdit && <ButtonLink to={`/h/${household.id}/setup/credit`}>Enter the credit</ButtonLink>}
      >
        <p>
          What the roof cost, the credit on it by the rate of the year it was completed, and how it goes through the
          returns year by year: carried in, limit, used, carried forward. With the papers, for whoever prepares the
          return.
        </p>
        <p className="mt-3">
          The credit belongs to the owner of the system. A roof on a lease or a power purchase agreement has none for
          the household.
        </p>
        {!household.canEdit && <p className="mt-3">The owner has not entered it yet.</p>}
      </EmptyState>
    </div>
  );
}

function CheckMark({ agrees }: { agrees: boolean | null }) {
  if (agrees === null) return <span className="mark-wait">nothing to compare</span>;
  return <span className={agrees ? 'mark-ok' : 'mark-no'}>{agrees ? 'agrees' : 'differs'}</span>;
}
