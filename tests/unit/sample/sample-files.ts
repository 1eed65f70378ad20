import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

export const SAMPLE_FOLDER = fileURLToPath(new URL('../../../fixtures/sample/', import.meta.url));

export function sampleText(path: string): string {
  return readFileSync(join(SAMPLE_FOLDER, path), 'utf8');
}

/** Every file below a folder but those of `make/`, as paths from the folder. */
export function filesBelow(folder: string): string[] {
  return readdirSync(folder, { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile())
    .map((entry) => join(entry.parentPath, entry.name).slice(folder.length).replace(/^\//, ''))
    .filter((path) => !path.startsWith('make/'))
    .sort();
}

const YEARS = ['2024', '2025', '2026'];
const DOWNLOADS = ['2025-08', '2026-08', '2026-10'];
const rowsOf = (text: string) => text.split(/\r?\n/).filter((row) => row !== '');

/** kWh with three decimals as Wh, without going through a float. */
function whOf(cell: string): number {
  const [whole = '', decimals = ''] = cell.split('.');
  return Number(whole) * 1000 + Number(decimals.padEnd(3, '0'));
}

/** One hour as three files have it; the hours of the three stand in the same order. */
export type SampleHour = { day: string; clock: string; productionWh: number; importWh: number; exportWh: number };

/** The hourly record, read by this test alone: production meter, delivered, received. */
export function sampleHours(): SampleHour[] {
  return DOWNLOADS.flatMap((name) => {
    const production = rowsOf(sampleText(`readings/production-meter-${name}.csv`)).slice(1);
    const delivered = rowsOf(sampleText(`readings/delivered-${name}.csv`)).slice(3);
    const received = rowsOf(sampleText(`readings/received-${name}.csv`)).slice(3);
    if (production.length !== delivered.length || production.length !== received.length) {
      throw new Error(`the files of ${name} differ in length`);
    }
    return production.map((row, at) => {
      const [stamp = '', made = ''] = row.split(',');
      const [bought, sent] = [delivered[at] ?? '', received[at] ?? ''].map((other) => other.split(','));
      const [day = '', clock = ''] = stamp.split(' ');
      const [month = '', date = '', fullYear = ''] = (bought?.[0] ?? '').split('/');
      if (`${fullYear}-${month.padStart(2, '0')}-${date.padStart(2, '0')}` !== day) {
        throw new Error(`row ${at} of ${name}: the dates differ`);
      }
      return {
        day,
        clock,
        productionWh: whOf(made),
        importWh: whOf(bought?.[2] ?? ''),
        exportWh: whOf(sent?.[2] ?? ''),
      };
    });
  });
}

export type MonitorHour = { stamp: string; watts: number };

export function monitorHours(): MonitorHour[] {
  return DOWNLOADS.flatMap((name) =>
    rowsOf(sampleText(`readings/monitor-${name}.csv`))
      .slice(1)
      .map((row) => {
        const [stamp = '', watts = ''] = row.split(',');
        return { stamp, watts: Number(watts) };
      }),
  );
}

export type PaperRow = Record<string, string>;
export type Paper = { from: string; to: string; rows: PaperRow[] };

/** Statements as their rows, in order; with the one left to log when asked. */
export function samplePapers(withNext = true): Paper[] {
  const paths = [...YEARS.map((year) => `statements/${year}.csv`), ...(withNext ? ['next/statement.csv'] : [])];
  const papers: Paper[] = [];
  for (const path of paths) {
    const [header = '', ...rows] = rowsOf(sampleText(path));
    const names = header.split(',');
    for (const row of rows) {
      const cells = row.split(',');
      const made: PaperRow = Object.fromEntries(names.map((name, at) => [name, cells[at] ?? '']));
      const from = made.service_from ?? '';
      const last = papers.at(-1);
      if (last?.from === from) last.rows.push(made);
      else papers.push({ from, to: made.service_to ?? '', rows: [made] });
    }
  }
  return papers;
}

/** "−12.34" as cents. */
export function centsOf(text: string): number {
  const match = /^(-?)(\d+)\.(\d\d)$/.exec(text);
  if (!match) throw new Error(`not an amount: ${text}`);
  return Number(`${match[1]}${match[2]}${match[3]}`);
}

export function rowsWhere(paper: Paper, record: string, item?: string): PaperRow[] {
  return paper.rows.filter((row) => row.record === record && (item === undefined || row.item === item));
}
