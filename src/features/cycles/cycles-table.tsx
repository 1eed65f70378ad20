import {
  columnVisibilityFeature,
  createColumnHelper,
  createSortedRowModel,
  rowSortingFeature,
  type SortingState,
  sortFn_basic,
  tableFeatures,
  useTable,
} from '@tanstack/react-table';
import { Fragment, type ReactNode } from 'react';
import { Link } from 'react-router-dom';
import type { CycleRow } from '#shared/api/cycles.ts';
import { cycleRange } from '#src/lib/format.ts';
import { CYCLE_COLUMNS, type CycleColumn } from './cycle-columns.tsx';
import { sumOf } from './cycle-rows.ts';

const features = tableFeatures({
  rowSortingFeature,
  columnVisibilityFeature,
  sortedRowModel: createSortedRowModel(),
  sortFns: { basic: sortFn_basic },
});
const helper = createColumnHelper<typeof features, CycleRow>();
const columns = helper.columns([
  helper.accessor((row) => row.to, { id: 'cycle', header: 'Cycle', sortFn: 'basic', sortDescFirst: true }),
  ...CYCLE_COLUMNS.map((column) =>
    helper.accessor((row) => column.sortBy(row) ?? undefined, {
      id: column.id,
      header: column.head,
      sortFn: 'basic',
      sortUndefined: 'last',
    }),
  ),
]);
const BY_ID = new Map(CYCLE_COLUMNS.map((column) => [column.id, column]));

/** The table's model: the rows sorted, the chosen columns visible. */
export function useCyclesTable(
  rows: CycleRow[],
  chosen: readonly string[],
  sorting: SortingState,
  onSorting: (next: SortingState) => void,
) {
  return useTable({
    features,
    columns,
    data: rows,
    state: {
      sorting,
      columnVisibility: Object.fromEntries(CYCLE_COLUMNS.map((column) => [column.id, chosen.includes(column.id)])),
    },
    onSortingChange: (update) => onSorting(typeof update === 'function' ? update(sorting) : update),
    enableSortingRemoval: false,
  });
}
export type CyclesTableModel = ReturnType<typeof useCyclesTable>;

/** The ruled table of cycles, with a subtotal under each year while the years stand together, and a total. */
export function CyclesTable({ table, base, phone }: { table: CyclesTableModel; base: string; phone: boolean }) {
  const shown = table.getRowModel().rows;
  const rows = shown.map((row) => row.original);
  const visible = CYCLE_COLUMNS.filter((column) => table.state.columnVisibility[column.id]);
  const byDate = table.state.sorting[0]?.id === 'cycle';
  return (
    <table className="ruled ruled-stack ruled-tight">
      <caption className="visually-hidden">Billing cycles</caption>
      <thead>
        {table.getHeaderGroups().map((group) => (
          <tr key={group.id}>
            {group.headers.map((header) => {
              const direction = header.column.getIsSorted();
              const unit = BY_ID.get(header.column.id)?.unit;
              const label = String(header.column.columnDef.header);
              return (
                <th
                  key={header.id}
                  scope="col"
                  aria-sort={direction === 'asc' ? 'ascending' : direction === 'desc' ? 'descending' : 'none'}
                >
                  {phone ? (
                    label
                  ) : (
                    <button
                      type="button"
                      className="min-h-8 border-0 bg-transparent p-0 text-inherit font-semibold [text-align:inherit] hover:underline"
                      onClick={header.column.getToggleSortingHandler()}
                    >
                      {label}
                      {unit && <span className="font-normal">, {unit}</span>}
                      {direction && <span aria-hidden="true">{direction === 'asc' ? ' ↑' : ' ↓'}</span>}
                    </button>
                  )}
                </th>
              );
            })}
          </tr>
        ))}
      </thead>
      <tbody>
        {shown.map((row, index) => {
          const year = row.original.to.slice(0, 4);
          const next = shown[index + 1]?.original.to.slice(0, 4);
          return (
            <Fragment key={row.original.to}>
              <tr>
                <th scope="row" className="whitespace-nowrap">
                  <Link
                    to={`${base}/cycles/${row.original.to}`}
                    className="underline decoration-rule underline-offset-4 hover:decoration-current"
                  >
                    {rangeWithYear(row.original)}
                  </Link>
                </th>
                {visible.map((column) => (
                  <td key={column.id} data-label={column.unit ? `${column.head}, ${column.unit}` : column.head}>
                    {column.cell(row.original)}
                  </td>
                ))}
              </tr>
              {byDate && year !== next && (
                <SumRow
                  head={year}
                  className="subtotal"
                  rows={rows.filter((one) => one.to.startsWith(year))}
                  columns={visible}
                />
              )}
            </Fragment>
          );
        })}
        <SumRow head="All shown" className="total" rows={rows} columns={visible} />
      </tbody>
    </table>
  );
}

function rangeWithYear(row: CycleRow): ReactNode {
  const range = cycleRange(row.from, row.to);
  return range.includes(row.to.slice(0, 4)) ? range : `${range} ${row.to.slice(0, 4)}`;
}

function SumRow({
  head,
  className,
  rows,
  columns,
}: {
  head: string;
  className: string;
  rows: readonly CycleRow[];
  columns: readonly CycleColumn[];
}) {
  return (
    <tr className={className}>
      <th scope="row" className="whitespace-nowrap">
        {head}
        <span className="font-normal text-soft">
          , {rows.length} {rows.length === 1 ? 'cycle' : 'cycles'}
        </span>
      </th>
      {columns.map((column) => (
        <td key={column.id} data-label={column.unit ? `${column.head}, ${column.unit}` : column.head}>
          {column.sum && <Sum column={column.sum} rows={rows} />}
        </td>
      ))}
    </tr>
  );
}

function Sum({ column, rows }: { column: NonNullable<CycleColumn['sum']>; rows: readonly CycleRow[] }) {
  const { total, missing } = sumOf(rows, column.of);
  if (missing === 0) return column.show(total);
  return (
    <span className="relative whitespace-nowrap">
      {column.show(total)}
      <abbr
        className="absolute left-full pl-0.5 font-normal no-underline"
        title={`Without ${missing} ${missing === 1 ? 'cycle that has' : 'cycles that have'} no figure`}
      >
        †
      </abbr>
    </span>
  );
}
