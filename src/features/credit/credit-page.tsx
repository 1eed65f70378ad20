import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { type CreditView, creditApi } from '#shared/api/credit.ts';
import { addressOf } from '#src/lib/api.ts';
import { dollars, money } from '#src/lib/format.ts';
import { type HouseholdContext, useHousehold } from '#src/lib/household.ts';
import { Button, ButtonLink } from '#src/ui/button.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { EmptyState, ErrorState, PageSkeleton } from '#src/ui/states.tsx';
import { usePhone } from '#src/ui/use-media.ts';
import { BasisSheet } from './basis-sheet.tsx';
import { CarriedInDialog } from './carried-in-dialog.tsx';
import { ChecksSheet } from './checks-sheet.tsx';
import { CostSheet } from './cost-sheet.tsx';
import { CreditBars } from './credit-bars.tsx';
import { creditQuery } from './credit-queries.ts';
import { creditLede, limitSource } from './credit-words.ts';
import { FormBlocks, FormTable } from './form-table.tsx';
import { Papers } from './papers.tsx';
import { PlanSheet } from './plan-sheet.tsx';
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
  const [carrying, setCarrying] = useState(false);
  const phone = usePhone();
  const change = household.canEdit ? setEditing : null;
  const years = view.credit?.years ?? [];
  const lastYear = view.lines.at(-1)?.taxYear;
  const notes = view.forms.flatMap((form) => (form.note ? [`${form.taxYear}: ${form.note}`] : []));
  const sources = years.flatMap((year) => limitSource(year, view));
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
          <span className="no-print flex flex-wrap gap-x-4">
            <Download
              endpoint={creditApi.summaryPdf}
              householdId={household.id}
              words="Summary for the preparer, PDF"
            />
            <Download endpoint={creditApi.summaryCsv} householdId={household.id} words="CSV" />
          </span>
        }
      >
        {phone ? <FormBlocks view={view} change={change} /> : <FormTable view={view} change={change} />}
        <CreditBars view={view} />
        {household.canEdit && (
          <p className="no-print mt-5 flex flex-wrap items-center gap-x-5">
            <Button look="plain" onClick={() => setEditing('new')}>
              Add a tax year
            </Button>
            <button type="button" className="link min-h-11" onClick={() => setCarrying(true)}>
              {view.credit?.carriedIn ? 'Change what was carried in' : 'Carried in from before this record'}
            </button>
          </p>
        )}
        {view.credit?.carriedIn && (
          <p className="hint mt-2">
            Carried in from before this record: line 16 of {view.credit.carriedIn.taxYear},{' '}
            {money(view.credit.carriedIn.amountCents)}.
          </p>
        )}
        {sources.length > 0 && <p className="hint mt-2">{sources.join(' ')}</p>}
        {notes.map((note) => (
          <p key={note} className="hint mt-2">
            {note}
          </p>
        ))}
      </Sheet>
      <PlanSheet view={view} addYear={household.canEdit ? () => setEditing('new') : null} />
      <div className="grid items-start gap-x-[26px] lg:grid-cols-2">
        <div className="min-w-0">
          <CostSheet view={view} householdId={household.id} canEdit={household.canEdit} />
          <BasisSheet view={view} />
        </div>
        <Papers view={view} householdId={household.id} canEdit={household.canEdit} />
      </div>
      <ChecksSheet view={view} />
      <p className="foot">
        This repeats figures {household.canEdit ? 'you' : 'the owner'} entered and the arithmetic printed on the form.
        It is not tax advice and does not decide whether you qualify. Carryforward shown is unused, not guaranteed.
        Check every figure against the form and instructions of its year, or ask a tax professional, before filing.
      </p>
      {carrying && view.credit && (
        <CarriedInDialog credit={view.credit} householdId={household.id} onClose={() => setCarrying(false)} />
      )}
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

function Download({
  endpoint,
  householdId,
  words,
}: {
  endpoint: { path: string };
  householdId: string;
  words: string;
}) {
  return (
    <a
      className="inline-flex min-h-11 items-center underline underline-offset-3 sm:min-h-6"
      href={addressOf(endpoint, { householdId })}
      download
    >
      {words}
    </a>
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
