import { performance } from 'node:perf_hooks';
import Database from 'better-sqlite3';
import { packDay } from '#server/db/packed-day.ts';
import { readProductionCsv } from '#server/importers/production-csv.ts';

export type ImportLine = { name: string; value: number; unit: string; ratio: number; aim: string };

const ROWS = 35_040;
const STEP_MS = 900_000;
const RUNS = 15;
const WARM_UP = 5;

/** A year of a roof's 15-minute energy in Wh, as a monitor exports it in local time of a zone without daylight time; the sum is known. */
function yearFile(): { bytes: Uint8Array; totalWh: number } {
  const lines = ['Time,Production (Wh)'];
  let totalWh = 0;
  for (let at = 0; at < ROWS; at += 1) {
    const quarter = at % 96;
    const season = 1 + Math.abs(182 - Math.floor(at / 96)) / -400;
    const value =
      quarter > 24 && quarter < 72 ? Math.round(season * (576 - (quarter - 48) ** 2) * (2 + ((at * 31) % 7) / 7)) : 0;
    totalWh += value;
    const time = new Date(Date.UTC(2025, 0, 1) + at * STEP_MS).toISOString().slice(0, 16).replace('T', ' ');
    lines.push(`${time},${value}`);
  }
  return { bytes: new TextEncoder().encode(`${lines.join('\n')}\n`), totalWh };
}

/** Reads the file as a user's upload is read, packs its days as they are stored, and inserts them in one transaction. */
function importYear(bytes: Uint8Array): number {
  const database = new Database(':memory:');
  database.exec(
    'CREATE TABLE interval_days (channel TEXT NOT NULL, day TEXT NOT NULL, minutes INTEGER NOT NULL, steps BLOB NOT NULL, PRIMARY KEY (channel, day)) STRICT',
  );
  const insert = database.prepare('INSERT INTO interval_days VALUES (?, ?, ?, ?)');
  const context = {
    mapping: null,
    channel: 'production' as const,
    timeZone: 'America/Phoenix',
    acWatts: 10_000,
    dcWatts: null,
  };
  const read = readProductionCsv({ fileName: 'year.csv', bytes }, context);
  if (!read.ok) throw new Error('the year of the benchmark is not read');
  database.transaction(() => {
    for (const { channel, day, minutes, values } of read.value.days) insert.run(channel, day, minutes, packDay(values));
  })();
  const { days } = database.prepare<[], { days: number }>('SELECT count(*) AS days FROM interval_days').get() ?? {
    days: 0,
  };
  database.close();
  if (days !== ROWS / 96 || read.value.faults.length > 0 || read.value.missingSteps > 0)
    throw new Error('the year is not whole');
  return read.value.totalWh;
}

/** The least a program could do: split at newlines and commas by hand, and insert every row in one transaction. Nothing is checked. */
function floorYear(bytes: Uint8Array): number {
  const database = new Database(':memory:');
  database.exec('CREATE TABLE readings (at TEXT NOT NULL, wh INTEGER NOT NULL) STRICT');
  const insert = database.prepare('INSERT INTO readings VALUES (?, ?)');
  const text = new TextDecoder().decode(bytes);
  database.transaction(() => {
    for (let from = text.indexOf('\n') + 1; from < text.length; ) {
      const end = text.indexOf('\n', from);
      const comma = text.indexOf(',', from);
      insert.run(text.slice(from, comma), Number(text.slice(comma + 1, end)));
      from = end + 1;
    }
  })();
  const { total } = database.prepare<[], { total: number }>('SELECT sum(wh) AS total FROM readings').get() ?? {
    total: 0,
  };
  database.close();
  return total;
}

/** Medians of both, run in turn so that a busy machine weighs on both alike. */
export async function benchImport(): Promise<ImportLine[]> {
  const { bytes, totalWh } = yearFile();
  const whole: number[] = [];
  const floor: number[] = [];
  for (let run = -WARM_UP; run < RUNS; run += 1) {
    for (const [work, times] of [
      [floorYear, floor],
      [importYear, whole],
    ] as const) {
      const began = performance.now();
      const total = work(bytes);
      if (run >= 0) times.push(performance.now() - began);
      if (total !== totalWh) throw new Error(`added up to ${total} Wh, not ${totalWh}`);
    }
  }
  const value = median(whole);
  const least = median(floor);
  const ratio = Math.round((value / least) * 100) / 100;
  const name = `import of ${ROWS} rows, read, packed and stored (floor ${Math.round(least)} ms)`;
  return [{ name, value: Math.round(value * 100) / 100, unit: 'ms', ratio, aim: '≤ 15×' }];
}

function median(times: number[]): number {
  const sorted = [...times].sort((a, b) => a - b);
  return sorted[Math.floor(sorted.length / 2)] ?? 0;
}
