import type { StatementBody } from '#shared/api/cycles.ts';
import type { ProductionMapping, SourceTable } from '#shared/api/log.ts';
import type { IntervalChannel, IntervalDay } from '#shared/facts/papers.ts';
import type { Fault } from '#shared/problem.ts';
import type { Day } from '#shared/units/day.ts';
import type { Wh } from '#shared/units/energy.ts';

/** A file as it came: its bytes and the name its owner gave it. */
export type FileInput = { fileName: string; bytes: Uint8Array };

/**
 * What a statement file holds. With faults and without the owner's word to keep the good rows, `statements` is empty: the file waits for a
 * corrected one. Row numbers count records from 1, as a spreadsheet shows them.
 */
export type StatementReading = {
  statements: { statement: StatementBody; firstRow: number; lastRow: number }[];
  table: SourceTable;
  faults: Fault[];
};

export type StatementOptions = {
  /** True once the owner has said that rows with faults shall be left out and the others kept. */
  keepGoodRows: boolean;
};

export type ProductionContext = {
  /** The owner's correction of how the file is read; null to have it worked out. */
  mapping: ProductionMapping | null;
  channel: IntervalChannel;
  /** The household's IANA zone: local days are cut in it. */
  timeZone: string;
  acWatts: number | null;
  dcWatts: number | null;
};

/**
 * What an interval or register file holds. `mapping.headerRow` counts from 1 (0: no header), its columns count from 0.
 * `totalWh` is the sum of all values in `days`; energy that fell in a gap and cannot be given to a day stands in `unallocatedWh` alone.
 */
export type ProductionReading = {
  mapping: ProductionMapping;
  /** What the reader is unsure of, by mapping field. */
  doubts: { field: string; message: string }[];
  columns: string[];
  table: SourceTable;
  /** Local days that hold at least one value, in order; steps without a reading are null. */
  days: Omit<IntervalDay, 'documentId'>[];
  firstDay: Day | null;
  lastDay: Day | null;
  /** Minutes of a step of `days`: 5, 15, 30, 60 or 1440. */
  minutes: number | null;
  totalWh: Wh;
  acceptedRows: number;
  rejectedRows: { row: number; reason: string }[];
  /** Steps without a value from the first reading to the last, whole missing days included. */
  missingSteps: number;
  /** Size of the negative readings that were counted as nothing (zero or more). */
  clippedNegativeWh: Wh;
  /** What the file's own total row says; null when there is none. */
  statedTotalWh: Wh | null;
  /** Energy of a register over gaps: measured, but of no known day. Not in `totalWh`. */
  unallocatedWh: Wh;
  faults: Fault[];
};
