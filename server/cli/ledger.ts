import { readFileSync } from 'node:fs';
import { pathToFileURL } from 'node:url';
import * as z from 'zod/mini';
import { EXPORT_FORMAT, EXPORT_VERSION, type HouseholdExport, householdExport } from '#shared/facts/household.ts';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import { ledgerReport } from '#shared/ledger/report.ts';

/**
 * `npm run --silent ledger -- household.json`: reads a household export and prints its ledger as JSON (`shared/ledger/report.ts` documents the
 * shape). What is wrong with the file is said on standard error with exit code 2; nothing is printed then.
 */
export function runLedger(
  args: readonly string[],
  out: { write(text: string): unknown },
  err: { write(text: string): unknown },
): number {
  const [path, ...more] = args;
  if (path === undefined || more.length > 0) {
    err.write('Usage: npm run --silent ledger -- household.json\n');
    return 2;
  }
  const read = readExport(path);
  if (!read.ok) {
    for (const line of read.lines) err.write(`${line}\n`);
    return 2;
  }
  const { facts, today } = read.found;
  out.write(`${JSON.stringify(ledgerReport(computeLedger(facts, { today })), null, 2)}\n`);
  return 0;
}

type Read = { ok: true; found: HouseholdExport } | { ok: false; lines: string[] };

/** As many faults as help; a file of another kind has thousands. */
const MOST_FAULTS = 20;

function readExport(path: string): Read {
  let text: string;
  try {
    text = readFileSync(path, 'utf8');
  } catch {
    return refuse(`${path}: the file cannot be opened.`);
  }
  let value: unknown;
  try {
    value = JSON.parse(text.replace(/^\uFEFF/, ''));
  } catch (error) {
    return refuse(`${path}: this is not JSON (${error instanceof Error ? error.message : 'unreadable'}).`);
  }
  const head = z.safeParse(z.looseObject({ format: z.string(), version: z.number() }), value);
  if (!head.success || head.data.format !== EXPORT_FORMAT) {
    return refuse(`${path}: this is not a household export. “format” must be “${EXPORT_FORMAT}”.`);
  }
  if (head.data.version !== EXPORT_VERSION) {
    return refuse(
      `${path}: version ${head.data.version} is not known here; this program reads version ${EXPORT_VERSION}.`,
    );
  }
  const parsed = z.safeParse(householdExport, value);
  if (parsed.success) return { ok: true, found: parsed.data };
  const { issues } = parsed.error;
  const lines = issues.slice(0, MOST_FAULTS).map((issue) => `${path}: ${fieldPath(issue.path)}: ${issue.message}`);
  if (issues.length > MOST_FAULTS) lines.push(`${path}: and ${issues.length - MOST_FAULTS} more.`);
  return { ok: false, lines };
}

function refuse(line: string): Read {
  return { ok: false, lines: [line] };
}

/** `facts.loan.payments[2].on` */
function fieldPath(path: readonly PropertyKey[]): string {
  if (path.length === 0) return 'the whole file';
  return path.reduce<string>((said, key) => {
    if (typeof key === 'number') return `${said}[${key}]`;
    return said === '' ? String(key) : `${said}.${String(key)}`;
  }, '');
}

if (process.argv[1] !== undefined && import.meta.url === pathToFileURL(process.argv[1]).href) {
  // Without a locale zod/mini says only "Invalid input".
  z.config(z.locales.en());
  process.exitCode = runLedger(process.argv.slice(2), process.stdout, process.stderr);
}
