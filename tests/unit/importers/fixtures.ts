import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import type { FileInput, ProductionContext, ProductionReading } from '#server/importers/contract.ts';
import { readProductionCsv } from '#server/importers/production-csv.ts';
import type { Result } from '#shared/problem.ts';

export const STATEMENTS = 'fixtures/statements/gablebook-csv';
export const PRODUCTION = 'fixtures/production';

/** The cases of a folder: every `<case>.csv` that has its `<case>.expected.json`. */
export function casesIn(folder: string): string[] {
  const names = readdirSync(folder);
  return names
    .filter((name) => name.endsWith('.csv'))
    .map((name) => name.slice(0, -4))
    .filter((name) => names.includes(`${name}.expected.json`));
}

export function fileOf(folder: string, name: string): FileInput {
  return { fileName: `${name}.csv`, bytes: new Uint8Array(readFileSync(join(folder, `${name}.csv`))) };
}

export function expectedOf(folder: string, name: string): unknown {
  return JSON.parse(readFileSync(join(folder, `${name}.expected.json`), 'utf8'));
}

export function textFile(text: string, fileName = 'file.csv'): FileInput {
  return { fileName, bytes: new TextEncoder().encode(text) };
}

export const PORT_CALDER: ProductionContext = {
  mapping: null,
  channel: 'production',
  timeZone: 'America/New_York',
  acWatts: 10_000,
  dcWatts: 11_480,
};

export function readProduction(text: string, context: Partial<ProductionContext> = {}): ProductionReading {
  const result: Result<ProductionReading> = readProductionCsv(textFile(text), { ...PORT_CALDER, ...context });
  if (!result.ok) throw new Error(`not read: ${result.problem.code} ${result.problem.detail}`);
  return result.value;
}
