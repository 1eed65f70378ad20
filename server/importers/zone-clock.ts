const SECONDS_PER_DAY = 86_400;
/** Clock changes lie further apart than this in every zone of the United States, so that no pair hides between two samples. */
const SAMPLE_DAYS = 14;
/** A zone is looked up in stretches of this length, each when it is first needed. */
const STRETCH = 26 * SAMPLE_DAYS * SECONDS_PER_DAY;

/** How a wall-clock time stands in its zone: it happened once, twice (clocks set back) or never (clocks set forward). */
export type WallKind = 'once' | 'twice' | 'gap';

/**
 * A zone's offsets, looked up once: Intl is far too slow to ask for every row. Seconds throughout; local seconds are a wall clock written as
 * if it were UTC.
 */
export type ZoneClock = {
  offsetAt: (utc: number) => number;
  /** The instant of a wall-clock time: the first of two, or the second when asked; in a gap, counted on from before the change. */
  toUtc: (local: number, second: boolean) => number;
  kindOf: (local: number) => WallKind;
};

/** A stretch of time with one offset. */
type Span = { from: number; to: number; offset: number };

const clocks = new Map<string, ZoneClock>();

export function isTimeZone(name: string): boolean {
  if (clocks.has(name)) return true;
  try {
    new Intl.DateTimeFormat('en-US', { timeZone: name });
    return name !== '';
  } catch {
    return false;
  }
}

function offsetAsker(zone: string): (utc: number) => number {
  const format = new Intl.DateTimeFormat('en-US', {
    timeZone: zone,
    hourCycle: 'h23',
    year: 'numeric',
    month: 'numeric',
    day: 'numeric',
    hour: 'numeric',
    minute: 'numeric',
    second: 'numeric',
  });
  return (utc) => {
    const part: Record<string, number> = {};
    for (const { type, value } of format.formatToParts(utc * 1000)) part[type] = Number(value);
    const { year = 1970, month = 1, day = 1, hour = 0, minute = 0, second = 0 } = part;
    return Date.UTC(year, month - 1, day, hour, minute, second) / 1000 - utc;
  };
}

/** The spans of one stretch: sampled, and each change between two samples found to the second by halving. */
function spansOf(ask: (utc: number) => number, begin: number): Span[] {
  const end = begin + STRETCH;
  const spans: Span[] = [];
  let open: Span = { from: begin, to: end, offset: ask(begin) };
  for (let at = begin; at < end; at += SAMPLE_DAYS * SECONDS_PER_DAY) {
    const next = at + SAMPLE_DAYS * SECONDS_PER_DAY;
    const after = ask(next);
    if (after === open.offset) continue;
    let low = at;
    let high = next;
    while (high - low > 1) {
      const middle = Math.floor((low + high) / 2);
      if (ask(middle) === open.offset) low = middle;
      else high = middle;
    }
    open.to = high;
    spans.push(open);
    open = { from: high, to: end, offset: after };
  }
  if (open.from < end) spans.push(open);
  return spans;
}

/** The zone's clock, made once for each zone. Throws on an unknown zone. */
export function zoneClock(zone: string): ZoneClock {
  const known = clocks.get(zone);
  if (known) return known;
  const ask = offsetAsker(zone);
  const stretches = new Map<number, Span[]>();
  let span: Span = { from: 0, to: 0, offset: 0 };
  const seek = (utc: number): Span => {
    if (utc >= span.from && utc < span.to) return span;
    const number = Math.floor(utc / STRETCH);
    let spans = stretches.get(number);
    if (spans === undefined) {
      spans = spansOf(ask, number * STRETCH);
      stretches.set(number, spans);
    }
    span = spans.find(({ to }) => utc < to) ?? span;
    return span;
  };
  const offsetAt = (utc: number) => seek(utc).offset;
  /** Offsets before and after any change near a wall-clock time; changes are never two within two days. */
  const around = (local: number): { early: number | null; late: number | null; before: number } => {
    const before = offsetAt(local - SECONDS_PER_DAY);
    const after = offsetAt(local + SECONDS_PER_DAY);
    const early = local - before;
    const late = local - after;
    return {
      early: offsetAt(early) === before ? early : null,
      late: before !== after && offsetAt(late) === after ? late : null,
      before,
    };
  };
  const clock: ZoneClock = {
    offsetAt,
    kindOf: (local) => {
      const { early, late } = around(local);
      return early !== null && late !== null ? 'twice' : early === null && late === null ? 'gap' : 'once';
    },
    toUtc: (local, second) => {
      const quick = local - span.offset;
      if (quick - span.from > 2 * SECONDS_PER_DAY && span.to - quick > 2 * SECONDS_PER_DAY) return quick;
      const { early, late, before } = around(local);
      if (second && late !== null) return late;
      return early ?? late ?? local - before;
    },
  };
  clocks.set(zone, clock);
  return clock;
}
