import { parseDay } from '#shared/units/day.ts';
import { parseKwh } from '#shared/units/energy.ts';

export type PastedUse = {
  rows: { from: string; to: string; kwh: string }[];
  faults: { number: number; line: string; message: string }[];
};

/**
 * Reads "from, to, kWh" lines as a spreadsheet copies them (tabs, semicolons, commas or wide gaps). Dates are ISO or month/day/year as
 * statements in the United States print them. A head line is passed over; a line that does not read is a fault, never skipped.
 */
export function readPastedUse(text: string): PastedUse {
  const found: PastedUse = { rows: [], faults: [] };
  text.split(/\r?\n/).forEach((line, index) => {
    if (line.trim() === '') return;
    const cells = split(line);
    const isHead = index === 0 && !/\d/.test(line);
    if (isHead) return;
    const from = dateOf(cells[0] ?? '');
    const to = dateOf(cells[1] ?? '');
    const kwh = (cells[2] ?? '').replace(/\s*kwh$/i, '');
    const fault = (message: string) => found.faults.push({ number: index + 1, line, message });
    if (cells.length < 3) fault('three columns are needed.');
    else if (from === null) fault(`“${cells[0]}” is no date.`);
    else if (to === null) fault(`“${cells[1]}” is no date.`);
    else if (from >= to) fault('the later read must come after the earlier one.');
    else if (parseKwh(kwh) === null) fault(`“${cells[2]}” is no number of kWh.`);
    else found.rows.push({ from, to, kwh: kwh.trim() });
  });
  return found;
}

// The third cell takes the rest of the line, since "1,284" has a comma of its own.
const THREE_CELLS = /^\s*"?([^\s,;"]+)"?\s*[\s,;]\s*"?([^\s,;"]+)"?\s*[\s,;]\s*"?([^"]*?)"?\s*$/;

function split(line: string): string[] {
  return THREE_CELLS.exec(line)?.slice(1) ?? [];
}

function dateOf(text: string): string | null {
  const american = /^(\d{1,2})\/(\d{1,2})\/(\d{4})$/.exec(text);
  if (!american) return parseDay(text);
  const [, month = '', day = '', year = ''] = american;
  return parseDay(`${year}-${month.padStart(2, '0')}-${day.padStart(2, '0')}`);
}
