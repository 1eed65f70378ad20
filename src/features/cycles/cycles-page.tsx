import { useQuery } from '@tanstack/react-query';
import type { SortingState } from '@tanstack/react-table';
import { type ReactNode, useId, useMemo, useState } from 'react';
import { useSearchParams } from 'react-router-dom';
import type { CycleRow } from '#shared/api/cycles.ts';
import { cycleState } from '#shared/ledger/cycle.ts';
import type { OwedList } from '#shared/ledger/owed-list.ts';
import { saveText, toCsv } from '#src/lib/csv.ts';
import { type HouseholdContext, useHousehold } from '#src/lib/household.ts';
import { Button, ButtonLink } from '#src/ui/button.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { EmptyState, ErrorState, PageSkeleton } from '#src/ui/states.tsx';
import { usePhone } from '#src/ui/use-media.ts';
import { useChosenColumns } from './chosen-columns.ts';
import { CYCLE_COLUMNS, FIRST_COLUMNS, FIRST_COLUMNS_PHONE } from './cycle-columns.tsx';
import { type CycleFilter, countByState, filterCycles, yearsOf } from './cycle-rows.ts';
import { cyclesQuery } from './cycles-queries.ts';
import { CyclesTable, useCyclesTable } from './cycles-table.tsx';
import { OwedSheet } from './owed-sheet.tsx';

/** Cycles: every billing cycle in one ruled table. */
export function CyclesPage() {
  const household = useHousehold();
  const list = useQuery(cyclesQuery(household.id));
  if (list.isPending) return <PageSkeleton />;
  if (list.isError) return <ErrorState error={list.error} retry={() => list.refetch()} />;
  if (list.data.rows.length === 0) return <FirstUse household={household} />;
  return <Cycles rows={list.data.rows} owed={list.data.owed} household={household} />;
}

function Cycles({ rows, owed, household }: { rows: CycleRow[]; owed: OwedList; household: HouseholdContext }) {
  const base = `/h/${household.id}`;
  const phone = usePhone();
  const [search, setSearch] = useSearchParams();
  const [sorting, setSorting] = useState<SortingState>([{ id: 'cycle', desc: true }]);
  const [chosen, toggle] = useChosenColumns(phone ? 'phone' : 'desk', phone ? FIRST_COLUMNS_PHONE : FIRST_COLUMNS);
  const filter = filterOf(search);
  const { state, year, text } = filter;
  const found = useMemo(() => filterCycles(rows, { state, year, text }), [rows, state, year, text]);
  const table = useCyclesTable(found, chosen, sorting, setSorting);
  const filtered = found.length !== rows.length;
  const set = (name: keyof CycleFilter, value: string) =>
    setSearch(
      (before) => {
        const after = new URLSearchParams(before);
        if (value === '') after.delete(name);
        else after.set(name, value);
        return after;
      },
      { replace: true },
    );
  const counts = countByState(rows);
  return (
    <div className="page">
      <Sentence title="Cycles" lede="One row for each billing cycle. Open one to see the bill beside the meters.">
        <b>{counts.head}</b>, {counts.rest}.
      </Sentence>
      <section className="sheet">
        <div className="no-print mb-4 flex flex-wrap items-end gap-x-5 gap-y-3">
          <FilterSelect label="Year" value={year ?? ''} onChange={(value) => set('year', value)}>
            <option value="">All years</option>
            {yearsOf(rows).map((one) => (
              <option key={one} value={one}>
                {one}
              </option>
            ))}
          </FilterSelect>
          <FilterSelect label="State" value={state ?? ''} onChange={(value) => set('state', value)}>
            <option value="">All states</option>
            {cycleState.options.map((one) => (
              <option key={one} value={one}>
                {one}
              </option>
            ))}
          </FilterSelect>
          <label className="block max-w-52 grow text-[15px] text-soft">
            Find
            <input
              type="search"
              className="input text-ink"
              value={text}
              placeholder="Sep 2025, estimate"
              onChange={(event) => set('text', event.target.value)}
            />
          </label>
          {phone && (
            <FilterSelect
              label="Sort by"
              value={`${sorting[0]?.id ?? 'cycle'}:${sorting[0]?.desc ? 'desc' : 'asc'}`}
              onChange={(value) => {
                const [id = 'cycle', direction] = value.split(':');
                setSorting([{ id, desc: direction === 'desc' }]);
              }}
            >
              {[{ id: 'cycle', head: 'Date' }, ...CYCLE_COLUMNS].flatMap((column) => [
                <option key={`${column.id}:desc`} value={`${column.id}:desc`}>
                  {column.head}, highest first
                </option>,
                <option key={`${column.id}:asc`} value={`${column.id}:asc`}>
                  {column.head}, lowest first
                </option>,
              ])}
            </FilterSelect>
          )}
          <span className="grow" />
          <ColumnChooser chosen={chosen} toggle={toggle} />
          <Button
            look="plain"
            disabled={found.length === 0}
            onClick={() =>
              saveRows(
                table.getRowModel().rows.map((row) => row.original),
                chosen,
              )
            }
          >
            Export CSV
          </Button>
        </div>
        {found.length === 0 ? (
          <div className="border-t-2 border-ink py-8">
            <p>No cycle matches.</p>
            <p className="mt-2">
              <Button look="link" onClick={() => setSearch({}, { replace: true })}>
                Show all {rows.length}
              </Button>
            </p>
          </div>
        ) : (
          <CyclesTable table={table} base={base} phone={phone} />
        )}
        <p className="hint mt-3">
          {filtered && found.length > 0 && `${found.length} of ${rows.length} cycles. `}– is a figure that is missing; †
          leaves out cycles without one.
        </p>
      </section>
      <OwedSheet owed={owed} base={base} />
    </div>
  );
}

function filterOf(search: URLSearchParams): CycleFilter {
  const state = cycleState.safeParse(search.get('state'));
  const year = search.get('year');
  return {
    state: state.success ? state.data : null,
    year: year && /^\d{4}$/.test(year) ? year : null,
    text: search.get('text') ?? '',
  };
}

function FilterSelect({
  label,
  value,
  onChange,
  children,
}: {
  label: string;
  value: string;
  onChange: (value: string) => void;
  children: ReactNode;
}) {
  const id = useId();
  return (
    <div className="text-[15px]">
      <label htmlFor={id} className="text-soft">
        {label}
      </label>
      <select id={id} className="input" value={value} onChange={(event) => onChange(event.target.value)}>
        {children}
      </select>
    </div>
  );
}

function ColumnChooser({ chosen, toggle }: { chosen: readonly string[]; toggle: (id: string) => void }) {
  return (
    <details className="relative">
      <summary className="btn btn-plain list-none">Choose columns</summary>
      <fieldset className="absolute left-0 z-10 mt-1 min-w-60 rounded-md border border-rule bg-sheet p-3 shadow-lg sm:right-0 sm:left-auto">
        <legend className="visually-hidden">Columns</legend>
        {CYCLE_COLUMNS.map((column) => (
          <label key={column.id} className="flex min-h-11 items-center gap-3 sm:min-h-9">
            <input
              type="checkbox"
              className="size-5 accent-accent"
              checked={chosen.includes(column.id)}
              onChange={() => toggle(column.id)}
            />
            {column.head}
          </label>
        ))}
      </fieldset>
    </details>
  );
}

/** Saves what is shown: the found rows in the table's order, the chosen columns. */
function saveRows(rows: readonly CycleRow[], chosen: readonly string[]): void {
  const columns = CYCLE_COLUMNS.filter((column) => chosen.includes(column.id));
  const head = columns.map((column) => (column.unit ? `${column.head} (${column.unit})` : column.head));
  const body = rows.map((row) => [row.from, row.to, ...columns.map((column) => column.csv(row))]);
  saveText('cycles.csv', toCsv([['From', 'To', ...head], ...body]), 'text/csv;charset=utf-8');
}

function FirstUse({ household }: { household: HouseholdContext }) {
  return (
    <div className="page">
      <Sentence title="Cycles">
        <b>No cycle yet.</b>
      </Sentence>
      <EmptyState
        title="What will stand here"
        action={household.canEdit && <ButtonLink to={`/h/${household.id}/log`}>Log the first month</ButtonLink>}
      >
        One row for each billing cycle: what the roof made, what the house used, what was billed, and whether the bill
        agrees with the meters. {household.canEdit ? '' : 'The owner has not posted a month yet.'}
      </EmptyState>
    </div>
  );
}
