import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { ProductionContext } from '#server/importers/contract.ts';
import { readProductionCsv } from '#server/importers/production-csv.ts';
import { readStatementCsv } from '#server/importers/statement-csv.ts';
import { casesIn, fileOf, PORT_CALDER, PRODUCTION, STATEMENTS } from './fixtures.ts';

/** Time of the processor, not of the clock: other work on the machine must not fail a test. */
const LONGEST_MS = 1000;

type Change = { kind: 'flip' | 'cut' | 'swap' | 'repeat' | 'insert'; at: number; to: number; byte: number };

const change: fc.Arbitrary<Change> = fc.record({
  kind: fc.constantFrom('flip', 'cut', 'swap', 'repeat', 'insert'),
  at: fc.nat(100_000),
  to: fc.nat(100_000),
  byte: fc.oneof(fc.nat(255), fc.constantFrom(...[...'";,\t\r\n-.:0129 eE|#='].map((sign) => sign.charCodeAt(0)))),
});

/** A file damaged as files are: bytes changed, ends cut off, lines swapped or repeated, marks put in. */
function damaged(bytes: Uint8Array, changes: Change[]): Uint8Array {
  let out = Uint8Array.from(bytes);
  for (const { kind, at, to, byte } of changes) {
    const place = out.length === 0 ? 0 : at % out.length;
    if (kind === 'flip') out[place] = byte;
    if (kind === 'cut') out = out.slice(0, place);
    if (kind === 'insert') out = Uint8Array.from([...out.slice(0, place), byte, ...out.slice(place)]);
    if (kind === 'swap' || kind === 'repeat') {
      const lines = Buffer.from(out).toString('latin1').split('\n');
      const [one, other] = [at % lines.length, to % lines.length];
      const kept = lines[one] ?? '';
      if (kind === 'swap') {
        lines[one] = lines[other] ?? '';
        lines[other] = kept;
      } else lines.splice(other, 0, kept);
      out = new Uint8Array(Buffer.from(lines.join('\n'), 'latin1'));
    }
  }
  return out;
}

const statementFiles = casesIn(STATEMENTS).map((name) => fileOf(STATEMENTS, name));
const productionFiles = casesIn(PRODUCTION).map((name) => fileOf(PRODUCTION, name));
const anyFile = fc.constantFrom(...statementFiles, ...productionFiles);
const changes = fc.array(change, { minLength: 1, maxLength: 8 });
const contexts: fc.Arbitrary<ProductionContext> = fc.record({
  mapping: fc.constant(null),
  channel: fc.constantFrom('production', 'monitor', 'import', 'export'),
  timeZone: fc.constantFrom('America/New_York', 'America/Denver', 'Pacific/Honolulu'),
  acWatts: fc.constantFrom(null, 10_000),
  dcWatts: fc.constant(null),
});

function quick<T>(run: () => T): T {
  const began = process.cpuUsage();
  const result = run();
  const { user, system } = process.cpuUsage(began);
  expect((user + system) / 1000).toBeLessThan(LONGEST_MS);
  return result;
}

describe('a damaged file gives a clear answer, quickly, and never throws', () => {
  it('to the statement reader', { timeout: 120_000 }, () => {
    fc.assert(
      fc.property(anyFile, changes, fc.boolean(), (file, list, keepGoodRows) => {
        const bytes = damaged(file.bytes, list);
        const result = quick(() => readStatementCsv({ fileName: file.fileName, bytes }, { keepGoodRows }));
        if (!result.ok) expect(result.problem.detail).not.toBeNull();
        else if (result.value.statements.length === 0) expect(result.value.faults.length).toBeGreaterThan(0);
      }),
      { numRuns: 1500 },
    );
  });

  it('to the production reader', { timeout: 120_000 }, () => {
    fc.assert(
      fc.property(anyFile, changes, contexts, (file, list, context) => {
        const bytes = damaged(file.bytes, list);
        const result = quick(() => readProductionCsv({ fileName: file.fileName, bytes }, context));
        if (!result.ok) expect(result.problem.detail).not.toBeNull();
        else {
          const values = result.value.days.flatMap((day) => day.values);
          expect(values.reduce<number>((total, value) => total + (value ?? 0), 0)).toBe(result.value.totalWh);
          expect(values.every((value) => value === null || (Number.isSafeInteger(value) && value >= 0))).toBe(true);
        }
      }),
      { numRuns: 1500 },
    );
  });

  it('and any mapping of a good file is either taken or refused', { timeout: 120_000 }, () => {
    const mapping = fc.record({
      channel: fc.constant('production' as const),
      headerRow: fc.integer({ min: -1, max: 12 }),
      timeColumn: fc.integer({ min: -1, max: 4 }),
      clockColumn: fc.option(fc.integer({ min: -1, max: 4 })),
      energyColumn: fc.integer({ min: -1, max: 4 }),
      unit: fc.constantFrom('Wh', 'kWh', 'W', 'kW'),
      quantity: fc.constantFrom('interval', 'register'),
      dateOrder: fc.constantFrom('ymd', 'mdy', 'dmy'),
      timeZone: fc.constantFrom('America/New_York', 'Etc/GMT+7', 'nowhere'),
      stamp: fc.constantFrom('start', 'end'),
      decimalMark: fc.constantFrom('.', ','),
    });
    fc.assert(
      fc.property(fc.constantFrom(...productionFiles), mapping, (file, given) => {
        const result = quick(() =>
          readProductionCsv(file, { ...PORT_CALDER, mapping: given as ProductionContext['mapping'] }),
        );
        if (!result.ok) expect(result.problem.detail).not.toBeNull();
      }),
      { numRuns: 1000 },
    );
  });
});

describe('a file cut at any line', () => {
  const lengths = (bytes: Uint8Array) => [...bytes.keys()].filter((at) => bytes[at] === 10).map((at) => at + 1);

  it.each(statementFiles.map((file) => [file.fileName, file] as const))(
    '%s: statements come only without faults',
    (_, file) => {
      for (const length of lengths(file.bytes)) {
        const result = readStatementCsv({ ...file, bytes: file.bytes.slice(0, length) }, { keepGoodRows: false });
        if (result.ok) expect(result.value.statements.length > 0).toBe(result.value.faults.length === 0);
      }
    },
  );

  it.each(productionFiles.map((file) => [file.fileName, file] as const))(
    '%s: reads no more than the whole',
    (_, file) => {
      const whole = readProductionCsv(file, PORT_CALDER);
      if (!whole.ok) throw new Error('a golden file is read');
      for (const length of lengths(file.bytes)) {
        const part = readProductionCsv({ ...file, bytes: file.bytes.slice(0, length) }, PORT_CALDER);
        if (part.ok) expect(part.value.acceptedRows).toBeLessThanOrEqual(whole.value.acceptedRows + 2);
        else expect(part.problem.detail).not.toBeNull();
      }
    },
  );
});

describe('large and contrived files', () => {
  const encode = (text: string) => new TextEncoder().encode(text);
  it.each([
    ['a sea of quotation marks', '"'.repeat(200_000)],
    ['open quotes on every line', `Time,kWh\n${'"2025-01-01 00:00,1\n'.repeat(10_000)}`],
    [
      'a thousand columns',
      `${Array.from({ length: 1000 }, (_, at) => `c${at}`).join(',')}\n${`${'1,'.repeat(999)}1\n`.repeat(100)}`,
    ],
    ['one endless line', 'x'.repeat(1_000_000)],
    ['delimiters alone', ';,\t|'.repeat(100_000)],
    ['long digits', `Time,kWh\n2025-01-01 00:00,${'9'.repeat(100_000)}\n2025-01-01 01:00,1\n2025-01-01 02:00,1\n`],
    [
      'dates a century apart',
      'Time,kWh\n1990-01-01 00:00,1\n1990-01-01 00:05,2\n1990-01-01 00:10,1\n2099-12-31 23:55,1\n',
    ],
    ['a statement of bad rows', `service_from,service_to,record,item,amount\n${'x,y,z,q,w\n'.repeat(20_000)}`],
  ])('%s', (_, text) => {
    const file = { fileName: 'odd.csv', bytes: encode(text) };
    quick(() => readStatementCsv(file, { keepGoodRows: true }));
    quick(() => readProductionCsv(file, PORT_CALDER));
  });
});
