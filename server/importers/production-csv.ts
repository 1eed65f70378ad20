import type { ProductionMapping } from '#shared/api/log.ts';
import { type Fault, fail, type Result, succeed } from '#shared/problem.ts';
import { kwhText, type Wh, wh } from '#shared/units/energy.ts';
import type { FileInput, ProductionContext, ProductionReading } from './contract.ts';
import { fileFault } from './faults.ts';
import { readFileText } from './file-text.ts';
import { type Days, daysOf } from './production-days.ts';
import { readSheet } from './production-dialect.ts';
import { intervalSteps, type Steps } from './production-energy.ts';
import { dailyGrid, layGrid } from './production-grid.ts';
import { inOrder } from './production-instants.ts';
import { type Doubts, planReading } from './production-mapping.ts';
import { dailyMoments, placeInTime } from './production-place.ts';
import { registerSteps } from './production-register.ts';
import { MOST_FAULTS } from './production-rows.ts';
import { isPower, scaleFor, settleValues } from './production-settle.ts';
import { sourceTable } from './source-table.ts';
import { isStatementHeader } from './statement-columns.ts';
import { isTimeZone } from './zone-clock.ts';

const MOST_BYTES = 20_000_000;
/** A file's own total may be rounded by row: so much of it, or so many Wh, is no difference. */
const TOTAL_SHARE = 0.001;
const TOTAL_WH = 10;

const kWh = (amount: Wh) => `${kwhText(amount)} kWh`;
const counted = (count: number, one: string, many: string) => `${count} ${count === 1 ? one : many}`;

function capped(fileName: string, faults: Fault[], count: number): Fault[] {
  const shown = [...faults].sort((a, b) => (a.row ?? 0) - (b.row ?? 0)).slice(0, MOST_FAULTS);
  const more = count - shown.length;
  if (more <= 0) return shown;
  return [
    ...shown,
    fileFault(
      fileName,
      'more-faults',
      `${counted(more, 'more row has a fault', 'more rows have faults')} not listed here.`,
    ),
  ];
}

/** What the data themselves leave in doubt, however the file was mapped. */
function addDataDoubts(doubts: Doubts, steps: Steps, days: Days, unallocatedWh: Wh, phase: number) {
  const say = (field: keyof ProductionMapping, message: string) => doubts.push({ field, message });
  if (phase > 0)
    say('stamp', `The times stand ${phase} seconds past a full step. They are counted to the step they fall in.`);
  if (steps.gaps > 0) {
    const gaps = counted(steps.gaps, 'gap', 'gaps');
    say(
      'quantity',
      `${kWh(unallocatedWh)} fell in ${gaps} between readings. It belongs to no known day and is in no total.`,
    );
  }
  if (steps.resets.length > 0) {
    say(
      'quantity',
      `The running total falls at row ${steps.resets.slice(0, 5).join(', ')}: it is read on from there, and the step before it is missing.`,
    );
  }
  if (steps.sameTwice > 0)
    say(
      'timeColumn',
      `${counted(steps.sameTwice, 'row says', 'rows say')} what an earlier row says already. Nothing is counted twice.`,
    );
  if (days.trailingZeroDays > 0) {
    const held = counted(days.trailingZeroDays, 'day at the end holds', 'days at the end hold');
    say(
      'energyColumn',
      `${held} only zeros: taken as missing, since files are often made before their last days are in.`,
    );
  }
  if (days.partialWh > 0)
    say('energyColumn', `${kWh(days.partialWh)} stands in steps that are not whole and is left out with them.`);
}

function totalFault(fileName: string, stated: Wh, days: Days): Fault | null {
  const allowed = Math.max(TOTAL_WH, Math.abs(stated) * TOTAL_SHARE);
  const signed = days.totalWh - days.clippedNegativeWh;
  if (Math.abs(stated - days.totalWh) <= allowed || Math.abs(stated - signed) <= allowed) return null;
  const message = `The file’s own total is ${kWh(stated)}; its rows add up to ${kWh(days.totalWh)}. Rows may be missing or read wrongly.`;
  return fileFault(fileName, 'total-differs', message);
}

/**
 * Reads a file of production, import or export: energy or power by step, or a running total, of one channel. How it is read is worked out
 * and given back as a mapping with its doubts, or taken from `context.mapping`. Values become whole Wh by local day of `context.timeZone`;
 * what is missing stays missing. Refuses what cannot be read at all: `file-empty`, `file-too-large`, `file-wrong-kind`, `file-unreadable`, and
 * a mapping that does not fit the file (`invalid-fields`).
 */
export function readProductionCsv(file: FileInput, context: ProductionContext): Result<ProductionReading> {
  const text = readFileText(file, MOST_BYTES);
  if (!text.ok) return text;
  const sheet = readSheet(text.value.text);
  if (sheet === null) return fail('file-unreadable', 'This file is not divided into columns.');
  if (sheet.rows.slice(0, 40).some((row) => isStatementHeader(row.cells))) {
    return fail('file-wrong-kind', 'This is a statement file. Add it as the month’s statement.');
  }
  if (!isTimeZone(context.timeZone)) return fail('invalid-fields', 'The household’s time zone is not known.');
  const { fileName } = file;
  const doubts: Doubts = [];
  const channel = context.mapping?.channel ?? context.channel;
  const planned = planReading(fileName, sheet, context, doubts);
  if (!planned.ok) return planned;
  const plan = planned.value;
  const { layout } = plan;
  const settled = settleValues(fileName, sheet.rows, plan, { ...context, channel }, doubts);
  if (!settled.ok) return settled;
  const { unit, quantity, stamp, rows, resets, step, daily, backwards } = settled.value;
  const register = quantity === 'register';

  const how = {
    stamp: daily ? ('start' as const) : stamp,
    quantity,
    step,
    backwards,
    timeZone: plan.timeZone,
    houseZone: context.timeZone,
    mayChangeZone: plan.given === null,
  };
  const placed = placeInTime(rows, how, daily ? [] : doubts);
  const at = daily ? dailyMoments(rows, placed, { register, stamp }) : placed.at;
  const grid = daily ? dailyGrid() : layGrid(placed.house, step, at);
  if (grid === null) {
    return fail(
      'file-unreadable',
      `Steps of ${step / 60} minutes cannot be kept. Export steps of 5, 15, 30 or 60 minutes, or days.`,
    );
  }
  const column = { time: layout.columns[layout.timeColumn] ?? '', energy: layout.columns[layout.energyColumn] ?? '' };
  const source = { fileName, grid, column, order: inOrder(at, backwards), at, row: rows.row, value: rows.value };
  const steps = register ? registerSteps(source, resets) : intervalSteps(source);
  const scale = scaleFor(unit, step);
  const days = daysOf(steps.days, grid, scale, channel, !register && channel !== 'import');
  const faults = capped(fileName, [...rows.faults, ...steps.faults], rows.faultCount + steps.faultCount);
  if (days.days.length === 0)
    return fail('file-unreadable', 'No step of this file could be read with a value.', faults);

  const whole = (amount: number) => wh(Math.floor(amount / scale.divisor + 0.5));
  const unallocatedWh = whole(steps.unallocated);
  const statedTotalWh = rows.statedTotal === null || register || isPower(unit) ? null : whole(rows.statedTotal);
  addDataDoubts(doubts, steps, days, unallocatedWh, grid.phase);
  if (sheet.openQuoteRow !== null) {
    const message = `Row ${sheet.openQuoteRow}: a quotation mark is opened and not closed as it should be. Take it out or double it.`;
    faults.push(fileFault(fileName, 'quotes', message, { row: sheet.openQuoteRow }));
  }
  const differs = statedTotalWh === null ? null : totalFault(fileName, statedTotalWh, days);
  if (differs) faults.push(differs);
  const mapping: ProductionMapping = {
    channel,
    headerRow: sheet.rows[layout.headerAt]?.row ?? 0,
    timeColumn: layout.timeColumn,
    clockColumn: layout.clockColumn,
    energyColumn: layout.energyColumn,
    unit,
    quantity,
    dateOrder: plan.rows.dateOrder,
    timeZone: placed.timeZone,
    stamp,
    decimalMark: plan.rows.decimalMark,
  };
  return succeed({
    mapping,
    doubts,
    columns: layout.columns,
    table: sourceTable(layout.columns, sheet.rows.slice(layout.headerAt + 1), faults),
    days: days.days,
    firstDay: days.days[0]?.day ?? null,
    lastDay: days.days.at(-1)?.day ?? null,
    minutes: grid.storedStep / 60,
    totalWh: days.totalWh,
    acceptedRows: rows.row.length - steps.rejected.length,
    rejectedRows: [...rows.rejected, ...steps.rejected].sort((a, b) => a.row - b.row),
    missingSteps: days.missingSteps,
    clippedNegativeWh: days.clippedNegativeWh,
    statedTotalWh,
    unallocatedWh,
    faults,
  });
}
