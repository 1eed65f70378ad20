const SECONDS_PER_DAY = 86_400;
/** Clock changes lie further apart than this in every zone of the United States, so that no pair hides between two samples. */
const SAMPLE_DAYS = 14;

/** How a wall-clock time stands in its zone: it happened once, twice (clocks set back) or never (clocks set forward). */
export type WallKind = 'once' | 'twice' | 'gap';

/**
 * A zone's offsets over a span of years, looked up once: Intl is far too slow to ask for every row. Seconds throughout; local seconds are a
 * wall clock written as if it were UTC.
 */
export type ZoneClock = {
  offsetAt: (utc: number) => number;
  /** The instant of a wall-clock time: the first of two, or the second when asked; in a gap, counted on from before the change. */
  toUtc: (local: number, second: boolean) => number;
  kindOf: (local: number) => WallKind;
};

export function isTimeZone(name: string): boolean {
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

/** The zone's clock for instants from `firstDay` to `lastDay` (days since 1970) and a little beyond. Throws on an unknown zone. */
export function zoneClock(zone: string, firstDay: number, lastDay: number): ZoneClock {
  const ask = offsetAsker(zone);
  const begin = (firstDay - 3) * SECONDS_PER_DAY;
  const end = (lastDay + 4) * SECONDS_PER_DAY;
  const starts = [Number.NEGATIVE_INFINITY];
  const offsets = [ask(begin)];
  for (let at = begin, before = ask(begin); at < end; at += SAMPLE_DAYS * SECONDS_PER_DAY) {
    const next = at + SAMPLE_DAYS * SECONDS_PER_DAY;
    const after = ask(next);
    if (after !== before) {
      let low = at;
      let high = next;
      while (high - low > 1) {
        const middle = Math.floor((low + high) / 2);
        if (ask(middle) === before) low = middle;
        else high = middle;
      }
      starts.push(high);
      offsets.push(after);
    }
    before = after;
  }
  const last = starts.length - 1;
  const start = (index: number) => (index > last ? Number.POSITIVE_INFINITY : (starts[index] ?? 0));
  const offset = (index: number) => offsets[Math.min(index, last)] ?? 0;
  let segment = 0;
  const seek = (utc: number) => {
    while (utc < start(segment)) segment -= 1;
    while (utc >= start(segment + 1)) segment += 1;
    return segment;
  };
  /** The segments in which a wall-clock time can lie are the one its own offset leads to, and its neighbours. */
  const readings = (local: number): number[] => {
    const near = seek(local - offset(segment));
    const found: number[] = [];
    for (let index = Math.max(0, near - 1); index <= Math.min(last, near + 1); index += 1) {
      const utc = local - offset(index);
      if (utc >= start(index) && utc < start(index + 1)) found.push(utc);
    }
    return found;
  };
  return {
    offsetAt: (utc) => offset(seek(utc)),
    kindOf: (local) => {
      const count = readings(local).length;
      return count === 0 ? 'gap' : count === 1 ? 'once' : 'twice';
    },
    toUtc: (local, second) => {
      const near = seek(local - offset(segment));
      const quick = local - offset(near);
      // Two days from any change there is one answer.
      if (quick - start(near) > 2 * SECONDS_PER_DAY && start(near + 1) - quick > 2 * SECONDS_PER_DAY) return quick;
      const found = readings(local);
      const first = found[0];
      if (first !== undefined) return second ? (found.at(-1) ?? first) : first;
      // In a gap the clock still counts by the offset before the change.
      for (let index = Math.max(0, near - 2); index < Math.min(last, near + 2); index += 1) {
        const change = start(index + 1);
        if (local - offset(index) >= change && local - offset(index + 1) < change) return local - offset(index);
      }
      return quick;
    },
  };
}
