import { createHash } from 'node:crypto';
import { readProductionCsv } from '#server/importers/production-csv.ts';
import { readStatementCsv } from '#server/importers/statement-csv.ts';
import { readSampleFile, readSampleHousehold, type SampleHousehold } from '#server/sample/sample-household.ts';
import { dcWattsOf } from '#shared/facts/dc-rating.ts';
import { DEFAULT_ASSUMPTIONS, type HouseholdFacts, householdFacts } from '#shared/facts/household.ts';
import type { DocumentFacts, IntervalChannel, IntervalDay, Statement } from '#shared/facts/papers.ts';
import type { Result } from '#shared/problem.ts';
import { type Day, day } from '#shared/units/day.ts';

export const SAMPLE_TODAY: Day = day('2026-11-03');
const UPLOADED = day('2026-11-02');
const BY = 'Priya Anand';

function must<T>(result: Result<T>, what: string): T {
  if (result.ok) return result.value;
  throw new Error(
    `${what}: ${result.problem.code} ${result.problem.detail ?? ''} ${JSON.stringify(result.problem.faults[0] ?? '')}`,
  );
}

function documentOf(file: { fileName: string; bytes: Uint8Array }, kind: DocumentFacts['kind']): DocumentFacts {
  return {
    id: file.fileName.replace('.csv', ''),
    fileName: file.fileName,
    kind,
    sha256: createHash('sha256').update(file.bytes).digest('hex'),
    size: file.bytes.length,
    uploadedOn: UPLOADED,
    uploadedBy: BY,
  };
}

/** The statements of one file of the sample, read by the product's own importer; a fault in them throws. */
export function sampleStatements(path: string): { document: DocumentFacts; statements: Statement[] } {
  const file = readSampleFile(path);
  const document = documentOf(file, 'statement');
  const reading = must(readStatementCsv(file, { keepGoodRows: false }), path);
  if (reading.faults.length > 0) throw new Error(`${path}: ${reading.faults[0]?.message}`);
  const statements = reading.statements.map(
    ({ statement, firstRow, lastRow }): Statement => ({
      ...statement,
      id: statement.to,
      revision: 1,
      source: { kind: 'file', documentId: document.id, fileName: document.fileName, firstRow, lastRow },
      reason: null,
      enteredBy: BY,
      enteredAt: `${UPLOADED}T18:00:00.000Z`,
    }),
  );
  return { document, statements };
}

/** The readings of one file of the sample, likewise, under the mapping the importer proposes. */
export function sampleReadings(
  path: string,
  channel: IntervalChannel,
  sample: SampleHousehold,
): { document: DocumentFacts; days: IntervalDay[] } {
  const file = readSampleFile(path);
  const document = documentOf(file, 'production');
  const reading = must(
    readProductionCsv(file, {
      mapping: null,
      channel,
      timeZone: sample.house.timeZone,
      acWatts: sample.roof.inverterAcWatts,
      dcWatts: dcWattsOf(sample.roof.arrays),
    }),
    path,
  );
  if (reading.faults.length > 0) throw new Error(`${path}: ${reading.faults[0]?.message}`);
  return { document, days: reading.days.map((one) => ({ ...one, documentId: document.id })) };
}

/** The sample household as facts, put together from its files without a server. `withNext` adds the cycle left for the owner to log. */
export function sampleFacts({ withNext = false, accepted = [] as HouseholdFacts['accepted'] } = {}): HouseholdFacts {
  const sample = readSampleHousehold();
  const statements = [...sample.papers.statements, ...(withNext ? ['next/statement.csv'] : [])].map(sampleStatements);
  const next = [
    { path: 'next/production.csv', channel: 'production' as const },
    { path: 'next/intervals-import.csv', channel: 'import' as const },
    { path: 'next/intervals-export.csv', channel: 'export' as const },
    { path: 'next/monitor.csv', channel: 'monitor' as const },
  ];
  const readings = [...sample.papers.readings, ...(withNext ? next : [])].map(({ path, channel }) =>
    sampleReadings(path, channel, sample),
  );
  const { loan } = sample.loan;
  const { credit } = sample.credit;
  const { incentive } = sample.incentive;
  return householdFacts.parse({
    house: { ...sample.house, ...sample.roof },
    plans: sample.plan.plans,
    opening: sample.plan.opening,
    loan: loan && { ...loan, payments: sample.money.loanPayments.map((row, at) => ({ ...row, id: `payment${at}` })) },
    mortgage: sample.mortgage.mortgage,
    credit: credit && { ...credit, years: sample.creditYears.map((year) => ({ ...year, typedBy: BY })) },
    incentive: incentive && {
      ...incentive,
      received: sample.money.receipts.map((row, at) => ({ ...row, id: `cheque${at}` })),
    },
    costs: [
      ...sample.cash.costs,
      ...sample.money.costs.map((row, at) => ({ ...row, id: `cost${at}`, documentId: null })),
    ],
    usageBefore: sample.before.usageBefore,
    documents: [...statements, ...readings].map(({ document }) => document),
    statements: statements.flatMap((one) => one.statements),
    intervals: readings.flatMap(({ days }) => days),
    accepted,
    assumptions: { ...DEFAULT_ASSUMPTIONS, upkeepYearlyCents: sample.cash.upkeepYearlyCents },
  });
}
