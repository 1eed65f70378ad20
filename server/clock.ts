import { type Day, day } from '#shared/units/day.ts';

/** The time now. An argument everywhere, so that a test can say what day it is. */
export type Clock = () => Date;

/** The civil date at an instant in an IANA zone. */
export function dayIn(timeZone: string, at: Date): Day {
  const parts = new Intl.DateTimeFormat('en-CA', {
    timeZone,
    year: 'numeric',
    month: '2-digit',
    day: '2-digit',
  }).formatToParts(at);
  const part = (type: string) => parts.find((found) => found.type === type)?.value ?? '';
  return day(`${part('year').padStart(4, '0')}-${part('month')}-${part('day')}`);
}

/** True for a zone this machine knows. */
export function isTimeZone(name: string): boolean {
  try {
    new Intl.DateTimeFormat('en-CA', { timeZone: name });
    return name.trim() !== '';
  } catch {
    return false;
  }
}
