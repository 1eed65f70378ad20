import { describe, expect, it } from 'vitest';
import type { ProductionContext } from '#server/importers/contract.ts';
import { readProductionCsv } from '#server/importers/production-csv.ts';
import { readStatementCsv } from '#server/importers/statement-csv.ts';
import { statementBody } from '#shared/api/cycles.ts';
import { draftReadings, sourceTable } from '#shared/api/log.ts';
import { intervalDay } from '#shared/facts/papers.ts';
import { casesIn, expectedOf, fileOf, PORT_CALDER, PRODUCTION, STATEMENTS } from './fixtures.ts';

const statements = casesIn(STATEMENTS);
const productions = casesIn(PRODUCTION);

describe('statement files read as their golden files say', () => {
  it('has cases to compare', () => expect(statements.length).toBeGreaterThanOrEqual(13));

  it.each(statements)('%s', (name) => {
    const file = fileOf(STATEMENTS, name);
    const asItIs = readStatementCsv(file, { keepGoodRows: false });
    const goodRows = readStatementCsv(file, { keepGoodRows: true });
    if (!asItIs.ok || !goodRows.ok) throw new Error('a golden statement file is read');
    const clean = asItIs.value.faults.length === 0;
    const kept = clean ? 'the same' : goodRows.value.statements;
    expect(JSON.parse(JSON.stringify({ asItIs, goodRows: kept }))).toEqual(expectedOf(STATEMENTS, name));
    expect(goodRows.value.faults).toEqual(asItIs.value.faults);
    if (clean) expect(goodRows.value).toEqual(asItIs.value);
    else expect(asItIs.value.statements).toEqual([]);
    for (const { statement } of goodRows.value.statements) expect(statementBody.parse(statement)).toEqual(statement);
    sourceTable.parse(asItIs.value.table);
  });
});

describe('production files read as their golden files say', () => {
  it('has cases to compare', () => expect(productions.length).toBeGreaterThanOrEqual(14));

  it.each(productions)('%s', (name) => {
    const golden = expectedOf(PRODUCTION, name) as { context: ProductionContext; writtenWh: number; result: unknown };
    const result = readProductionCsv(fileOf(PRODUCTION, name), golden.context);
    expect(JSON.parse(JSON.stringify(result))).toEqual(golden.result);
    if (!result.ok) throw new Error('a golden production file is read');
    // The total was added up apart from the reader when the file was made.
    expect(result.value.totalWh).toBe(golden.writtenWh);
    for (const day of result.value.days) intervalDay.parse({ ...day, documentId: null });
    const { rejectedRows, ...rest } = result.value;
    const draft = {
      ...rest,
      rejectedRows: rejectedRows.length,
      key: 'k',
      documentId: 'd',
      fileName: 'f',
      keepGoodRows: false,
      overlap: { sameDays: 0, differentDays: [] },
    };
    draftReadings.parse(draft);
  });

  it.each(productions)('%s reads the same when its own mapping is given back', (name) => {
    const { context } = expectedOf(PRODUCTION, name) as { context: ProductionContext };
    const file = fileOf(PRODUCTION, name);
    const first = readProductionCsv(file, context);
    if (!first.ok) throw new Error('a golden production file is read');
    const again = readProductionCsv(file, { ...context, mapping: first.value.mapping });
    if (!again.ok) throw new Error(`its own mapping was refused: ${again.problem.detail}`);
    const kept = ({ doubts: _, rejectedRows: __, faults: ___, table: ____, ...rest }: typeof again.value) => rest;
    expect(kept(again.value)).toEqual(kept(first.value));
  });
});

describe('a reader declines the files of the other', () => {
  it.each(productions)('the statement reader declines %s', (name) => {
    const result = readStatementCsv(fileOf(PRODUCTION, name), { keepGoodRows: true });
    expect(result.ok ? 'read' : result.problem.code).toBe('file-unreadable');
  });

  it.each(statements)('the production reader declines %s', (name) => {
    for (const channel of ['production', 'monitor', 'import', 'export'] as const) {
      const result = readProductionCsv(fileOf(STATEMENTS, name), { ...PORT_CALDER, channel });
      expect(result.ok ? 'read' : result.problem.code).toBe('file-wrong-kind');
    }
  });
});
