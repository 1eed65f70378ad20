import type { ProductionMapping } from '#shared/api/log.ts';
import { fail, type Result, succeed } from '#shared/problem.ts';
import { decimalMarkOfColumn } from './amount-text.ts';
import type { ProductionContext, ProductionReading } from './contract.ts';
import { fileFault } from './faults.ts';
import { columnNames, findLayout, type Layout, numbersIn } from './production-columns.ts';
import type { Sheet } from './production-dialect.ts';
import { dateOrderOf, type RowPlan } from './production-rows.ts';
import { isTimeZone } from './zone-clock.ts';

export type Doubts = ProductionReading['doubts'];

/** What is settled before the values are read. Null fields wait for the values, unless the owner's mapping gives them. */
export type Plan = { layout: Layout; rows: Omit<RowPlan, 'keep'>; timeZone: string; given: ProductionMapping | null };

const named = (layout: Layout, column: number) => `“${layout.columns[column] ?? `Column ${column + 1}`}”`;

/** The layout as the owner's mapping says it, checked against the file. */
function givenPlan(fileName: string, sheet: Sheet, mapping: ProductionMapping): Result<Plan> {
  const headerAt = sheet.rows.findIndex((row) => row.row === mapping.headerRow);
  const below = sheet.rows.slice(headerAt + 1);
  const width = sheet.rows.slice(0, 400).reduce((most, row) => Math.max(most, row.cells.length), 0);
  const wrong: [keyof ProductionMapping, string][] = [];
  if (headerAt < 0 && mapping.headerRow > 0)
    wrong.push(['headerRow', `Row ${mapping.headerRow} is empty or not in the file.`]);
  if (below.length === 0) wrong.push(['headerRow', 'No rows stand below this header.']);
  for (const field of ['timeColumn', 'clockColumn', 'energyColumn'] as const) {
    const column = mapping[field];
    if (column !== null && (column < 0 || column >= width)) wrong.push([field, `The file has ${width} columns.`]);
  }
  if (mapping.energyColumn === mapping.timeColumn)
    wrong.push(['energyColumn', 'Time and energy cannot be the same column.']);
  if (!isTimeZone(mapping.timeZone)) wrong.push(['timeZone', 'This is not a known time zone.']);
  if (wrong.length > 0) {
    const faults = wrong.map(([field, message]) => ({ ...fileFault(fileName, 'mapping', message), field }));
    return fail('invalid-fields', faults[0]?.message ?? null, faults);
  }
  const layout: Layout = {
    headerAt,
    dataAt: headerAt + 1,
    columns: columnNames(sheet.rows, headerAt, width),
    timeColumn: mapping.timeColumn,
    clockColumn: mapping.clockColumn,
    numbers: numbersIn(below, mapping.timeColumn),
    energyColumn: mapping.energyColumn,
    unit: mapping.unit,
    unitsRow: null,
    rivals: [],
    endStamps: false,
  };
  return succeed({ layout, rows: { ...mapping, layout }, timeZone: mapping.timeZone, given: mapping });
}

/** Works out how the file is read, or takes the owner's word; says what it is unsure of. */
export function planReading(fileName: string, sheet: Sheet, context: ProductionContext, doubts: Doubts): Result<Plan> {
  if (context.mapping) return givenPlan(fileName, sheet, context.mapping);
  const layout = findLayout(sheet.rows, context.channel);
  if (layout === 'pivoted') {
    return fail(
      'file-unreadable',
      'Each row of this file is a day with its hours across. Export it with one row per reading.',
    );
  }
  if (layout === null) {
    return fail('file-unreadable', 'No column of dates or times beside a column of energy was found in this file.');
  }
  const cells = sheet.rows.slice(layout.dataAt).map((row) => row.cells[layout.energyColumn] ?? '');
  const decimal = decimalMarkOfColumn(cells, sheet.delimiter);
  if (!decimal.certain) {
    const message = `Numbers such as 1,234 could be read in two ways. The ${decimal.mark === ',' ? 'comma' : 'point'} is taken as the decimal mark.`;
    doubts.push({ field: 'decimalMark', message });
  }
  const dates =
    layout.numbers === null
      ? dateOrderOf(sheet.rows, layout.dataAt, layout.timeColumn)
      : { order: 'ymd' as const, certain: true };
  if (!dates.certain) {
    const read = dates.order === 'mdy' ? 'month first' : 'day first';
    doubts.push({
      field: 'dateOrder',
      message: `No date in the file says which number is the month. They are read ${read}.`,
    });
  }
  if (layout.rivals.length > 0) {
    const others = layout.rivals
      .map((column) => named(layout, column))
      .slice(0, 6)
      .join(', ');
    const message = `${named(layout, layout.energyColumn)} is read, and only that. ${others} could be meant as well; if they are parts of one roof, add them up in the file first.`;
    doubts.push({ field: 'energyColumn', message });
  }
  const rows = {
    layout,
    timeColumn: layout.timeColumn,
    clockColumn: layout.clockColumn,
    energyColumn: layout.energyColumn,
    dateOrder: dates.order,
    decimalMark: decimal.mark,
  };
  return succeed({ layout, rows, timeZone: context.timeZone, given: null });
}
