import type { ProductionMapping } from '#shared/api/log.ts';

type DateOrder = ProductionMapping['dateOrder'];

/**
 * A moment as a file writes it. `day` counts from 1970-01-01 in the file's own clock, `second` from its midnight; `offset` is seconds east
 * of UTC where the text states it, else null. An epoch is a moment at offset zero.
 */
export type Stamp = { day: number; second: number; offset: number | null; dateOnly: boolean; midnight24: boolean };

/** Readings of a home's roof: anything outside these years is a misread number. */
const FIRST_YEAR = 1990;
const LAST_YEAR = 2099;
const SECONDS_PER_DAY = 86_400;
/** Day 0 of spreadsheet serials (1899-12-30) before 1970-01-01. */
const SERIAL_EPOCH = 25_569;

const MONTHS = ['jan', 'feb', 'mar', 'apr', 'may', 'jun', 'jul', 'aug', 'sep', 'oct', 'nov', 'dec'];

/** Abbreviations United States loggers print, in hours from UTC (common practice, no source). */
const ZONE_HOURS: Record<string, number> = {
  Z: 0,
  UTC: 0,
  GMT: 0,
  EST: -5,
  EDT: -4,
  CST: -6,
  CDT: -5,
  MST: -7,
  MDT: -6,
  PST: -8,
  PDT: -7,
  AKST: -9,
  AKDT: -8,
  HST: -10,
};

/** Days since 1970-01-01; null when the date does not exist or lies outside the years a roof can have. */
export function civilDay(year: number, month: number, date: number): number | null {
  if (year < FIRST_YEAR || year > LAST_YEAR || month < 1 || month > 12 || date < 1 || date > 31) return null;
  const made = new Date(Date.UTC(year, month - 1, date));
  return made.getUTCDate() === date ? made.getTime() / 86_400_000 : null;
}

function fullYear(text: string): number {
  return text.length === 2 ? 2000 + Number(text) : Number(text);
}

/** The two leading numbers of a date that is neither year-first nor named, for settling which is the month. */
export function leadingPair(text: string): { first: number; second: number; mark: string; year: number } | null {
  const match = /^(\d{1,2})([-/.])(\d{1,2})\2(\d{4}|\d{2})(?!\d)/.exec(text.trim());
  if (!match) return null;
  return { first: Number(match[1]), second: Number(match[3]), mark: match[2] ?? '/', year: fullYear(match[4] ?? '') };
}

function readDateText(text: string, order: DateOrder): number | null {
  let match = /^(\d{4})([-/.])(\d{1,2})\2(\d{1,2})$/.exec(text) ?? /^(\d{4})()(\d{2})(\d{2})$/.exec(text);
  if (match) return civilDay(Number(match[1]), Number(match[3]), Number(match[4]));
  const pair = /^(\d{1,2})([-/.])(\d{1,2})\2(\d{4}|\d{2})$/.exec(text);
  if (pair) {
    const [first, second, last] = [pair[1] ?? '', pair[3] ?? '', pair[4] ?? ''];
    if (order === 'ymd') return last.length === 2 ? civilDay(fullYear(first), Number(second), Number(last)) : null;
    const [month, date] = order === 'mdy' ? [first, second] : [second, first];
    return civilDay(fullYear(last), Number(month), Number(date));
  }
  const named = text.replace(/^(mon|tue|wed|thu|fri|sat|sun)[a-z]*[.,]?\s+/i, '');
  match = /^(\d{1,2})[-\s.]+([a-z]{3,9})\.?[-\s,]+(\d{4}|\d{2})$/i.exec(named);
  if (match) return civilDay(fullYear(match[3] ?? ''), monthNamed(match[2] ?? ''), Number(match[1]));
  match = /^([a-z]{3,9})\.?[-\s]+(\d{1,2}),?[-\s]+(\d{4})$/i.exec(named);
  if (match) return civilDay(Number(match[3]), monthNamed(match[1] ?? ''), Number(match[2]));
  return null;
}

function monthNamed(name: string): number {
  return MONTHS.indexOf(name.slice(0, 3).toLowerCase()) + 1;
}

/** What follows the digits of a clock: ` PM`, `Z`, `-07:00`, ` MST`; undefined when it is something else. */
function readClockTail(text: string): { half: 'a' | 'p' | null; offset: number | null } | undefined {
  const match = /^\s*(?:([ap])\.?\s?m\.?)?\s*(?:([-+\u2212])(\d{2}):?(\d{2})?|\(?([A-Za-z]{1,4})\)?)?$/i.exec(text);
  if (!match) return undefined;
  const half = match[1] === undefined ? null : match[1].toLowerCase() === 'a' ? 'a' : 'p';
  if (match[2] !== undefined) {
    const hours = Number(match[3]);
    const minutes = Number(match[4] ?? '0');
    if (hours > 14 || minutes > 59) return undefined;
    const size = hours * 3600 + minutes * 60;
    return { half, offset: match[2] === '+' ? size : -size };
  }
  if (match[5] === undefined) return { half, offset: null };
  const hours = ZONE_HOURS[match[5].toUpperCase()];
  return hours === undefined ? undefined : { half, offset: hours * 3600 };
}

/**
 * A reader of stamps in one date order. Dates and clock tails repeat from row to row, so each is read once and remembered; what is left per
 * row is a handful of digits. Reads ISO and slashed dates, month names, 12- and 24-hour clocks, `24:00`, offsets and US abbreviations, and
 * compact dates; epochs and spreadsheet serials only when `numbers` says that the column holds them.
 */
export function stampReader(order: DateOrder, numbers: 'epoch' | 'serial' | null): (text: string) => Stamp | null {
  let lastDate = '';
  let lastDay: number | null = null;
  let lastTail = '';
  let tail: ReturnType<typeof readClockTail> = { half: null, offset: null };
  const dayOf = (text: string) => {
    if (text !== lastDate) {
      lastDate = text;
      lastDay = readDateText(text, order);
    }
    return lastDay;
  };
  return (raw) => {
    const text = raw.trim().replace(/^="(.*)"$/, '$1');
    if (numbers === 'epoch') return readEpoch(text);
    if (numbers === 'serial') return readSerial(text);
    const colon = text.indexOf(':');
    if (colon < 0) {
      const compact = /^(\d{8})[T ]?(\d{2})(\d{2})(\d{2})?(Z)?$/.exec(text);
      const day = dayOf(compact ? (compact[1] ?? '') : text);
      if (day === null) return null;
      if (!compact) return { day, second: 0, offset: null, dateOnly: true, midnight24: false };
      return clock(day, Number(compact[2]), Number(compact[3]), Number(compact[4] ?? '0'), null, compact[5] ? 0 : null);
    }
    let start = colon;
    while (start > 0 && colon - start < 2 && isDigit(text.charCodeAt(start - 1))) start -= 1;
    if (start === colon || start === 0 || isDigit(text.charCodeAt(start - 1))) return null;
    let dateEnd = start;
    while (dateEnd > 0 && isJoint(text.charCodeAt(dateEnd - 1))) dateEnd -= 1;
    const day = dateEnd === start ? null : dayOf(text.slice(0, dateEnd));
    if (day === null) return null;
    const minute = twoDigits(text, colon + 1);
    let rest = colon + 3;
    let second = 0;
    if (text.charCodeAt(rest) === 58) {
      second = twoDigits(text, rest + 1);
      rest += 3;
      if (text.charCodeAt(rest) === 46 || text.charCodeAt(rest) === 44) {
        rest += 1;
        while (isDigit(text.charCodeAt(rest))) rest += 1;
      }
    }
    const tailText = text.slice(rest);
    if (tailText !== lastTail) {
      lastTail = tailText;
      tail = readClockTail(tailText);
    }
    if (tail === undefined || minute < 0 || second < 0) return null;
    return clock(day, Number(text.slice(start, colon)), minute, second, tail.half, tail.offset);
  };
}

const isDigit = (code: number) => code >= 48 && code <= 57;
/** Between a date and its clock: space, T, comma. */
const isJoint = (code: number) => code === 32 || code === 84 || code === 116 || code === 44 || code === 0xa0;

function twoDigits(text: string, at: number): number {
  const tens = text.charCodeAt(at);
  const ones = text.charCodeAt(at + 1);
  return isDigit(tens) && isDigit(ones) ? (tens - 48) * 10 + ones - 48 : -1;
}

function clock(
  day: number,
  hour: number,
  minute: number,
  second: number,
  half: 'a' | 'p' | null,
  offset: number | null,
): Stamp | null {
  if (minute > 59 || second > 59 || hour > 24 || (hour === 24 && (minute > 0 || second > 0 || half !== null)))
    return null;
  if (half !== null && (hour < 1 || hour > 12)) return null;
  const hour24 = half === null ? hour : (hour % 12) + (half === 'p' ? 12 : 0);
  if (hour24 === 24) return { day: day + 1, second: 0, offset, dateOnly: false, midnight24: true };
  return { day, second: hour24 * 3600 + minute * 60 + second, offset, dateOnly: false, midnight24: false };
}

function readEpoch(text: string): Stamp | null {
  const match = /^(\d{9,10})(?:\.\d+)?$|^(\d{12,13})$/.exec(text);
  if (!match) return null;
  const seconds = match[1] === undefined ? Math.floor(Number(match[2]) / 1000) : Number(match[1]);
  const day = Math.floor(seconds / SECONDS_PER_DAY);
  return { day, second: seconds - day * SECONDS_PER_DAY, offset: 0, dateOnly: false, midnight24: false };
}

function readSerial(text: string): Stamp | null {
  const match = /^(\d{5})(?:[.,](\d{1,15}))?$/.exec(text);
  if (!match) return null;
  const day = Number(match[1]) - SERIAL_EPOCH;
  const part = match[2] === undefined ? 0 : Math.round((Number(match[2]) / 10 ** match[2].length) * SECONDS_PER_DAY);
  if (part === SECONDS_PER_DAY) return { day: day + 1, second: 0, offset: null, dateOnly: false, midnight24: false };
  return { day, second: part, offset: null, dateOnly: match[2] === undefined, midnight24: false };
}

/** Brings a cell that holds only a time of day to `h:mm`: `1345`, or an hour `1`…`24`; a clock is left as it is. Null when it is neither. */
export function clockText(cell: string): string | null {
  const text = cell.trim();
  if (/^\d{1,2}:\d{2}/.test(text)) return text;
  const packed = /^(\d{2})(\d{2})$/.exec(text);
  if (packed) return `${packed[1]}:${packed[2]}`;
  const named = /^(\d{1,2})\s*([ap])\.?m\.?$/i.exec(text);
  if (named) return `${named[1]}:00 ${named[2]}m`;
  return /^\d{1,2}$/.test(text) ? `${text}:00` : null;
}
