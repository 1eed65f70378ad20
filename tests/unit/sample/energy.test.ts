import { describe, expect, it } from 'vitest';
import { monitorHours, sampleHours } from './sample-files.ts';

const hours = sampleHours();
const DC_KW = 11.48;
const zone = new Intl.DateTimeFormat('en', { timeZone: 'America/Los_Angeles', timeZoneName: 'short' });
const LATITUDE = (44.6 * Math.PI) / 180;

const total = (from: string, to: string, of: (hour: (typeof hours)[number]) => number) =>
  hours.filter(({ day }) => day >= from && day < to).reduce((sum, hour) => sum + of(hour), 0) / 1000;

/**
 * Highest sun of an hour in degrees, by the plain textbook declination and hour angle: a second opinion, not the generator's formula. Local
 * noon is taken a quarter of an hour either way, which covers the equation of time and the distance to the zone's meridian.
 */
function highestSun(day: string, clock: string): number {
  const date = (Date.parse(day) - Date.parse(`${day.slice(0, 4)}-01-01`)) / 86_400_000 + 1;
  const declination = ((-23.44 * Math.PI) / 180) * Math.cos((2 * Math.PI * (date + 10)) / 365);
  const summer = zone.format(Date.parse(`${day}T20:00:00Z`)).includes('PDT');
  const start = Number(clock.slice(0, 2)) - (summer ? 1 : 0) - (124 - 120) / 15;
  let highest = -90;
  for (let at = start - 0.3; at <= start + 1.3; at += 0.1) {
    const angle = ((at - 12) * 15 * Math.PI) / 180;
    const sine =
      Math.sin(LATITUDE) * Math.sin(declination) + Math.cos(LATITUDE) * Math.cos(declination) * Math.cos(angle);
    highest = Math.max(highest, (Math.asin(sine) * 180) / Math.PI);
  }
  return highest;
}

describe('the sample’s energy', () => {
  it('covers every hour from switch-on to the last read, with days of 23 and 25 hours', () => {
    const days = new Map<string, number>();
    for (const { day } of hours) days.set(day, (days.get(day) ?? 0) + 1);
    expect([...days.keys()].at(0)).toBe('2024-08-14');
    expect([...days.keys()].at(-1)).toBe('2026-10-13');
    expect(days.size).toBe(791);
    expect(Object.fromEntries([...days].filter(([, count]) => count !== 24))).toEqual({
      '2024-11-03': 25,
      '2025-03-09': 23,
      '2025-11-02': 25,
      '2026-03-08': 23,
    });
  });

  it('sends out no more than it makes, and the house never uses less than it needs to stay alive, in every hour', () => {
    const wrong = hours.filter(({ productionWh, importWh, exportWh }) => {
      const use = importWh + productionWh - exportWh;
      return exportWh > productionWh || exportWh < 0 || importWh < 0 || use < 90 || use > 14_000;
    });
    expect(wrong).toEqual([]);
  });

  it('makes nothing while the sun is down and never more than the inverter gives', () => {
    const night = hours.filter(({ day, clock }) => highestSun(day, clock) < 0);
    expect(night.length).toBeGreaterThan(7000);
    expect(night.filter(({ productionWh }) => productionWh !== 0)).toEqual([]);
    expect(Math.max(...hours.map(({ productionWh }) => productionWh))).toBeLessThanOrEqual(9600);
  });

  it('yields 1,050 to 1,200 kWh per kW of modules in each year', () => {
    for (const [from, to] of [
      ['2024-08-14', '2025-08-14'],
      ['2025-01-01', '2026-01-01'],
      ['2025-08-14', '2026-08-14'],
    ] as const) {
      const specific = total(from, to, ({ productionWh }) => productionWh) / DC_KW;
      expect(specific).toBeGreaterThan(1050);
      expect(specific).toBeLessThan(1200);
    }
  });

  it('uses 11 to 13 MWh a year, more in winter than in summer', () => {
    const use = (from: string, to: string) =>
      total(from, to, (hour) => hour.importWh + hour.productionWh - hour.exportWh);
    expect(use('2025-01-01', '2026-01-01')).toBeGreaterThan(11_000);
    expect(use('2025-01-01', '2026-01-01')).toBeLessThan(13_000);
    expect(use('2025-12-01', '2026-02-01')).toBeGreaterThan(1.3 * use('2026-06-01', '2026-08-01'));
  });

  it('is no sine wave: neighbouring days of one season differ by half and more', () => {
    const byDay = new Map<string, number>();
    for (const { day, productionWh } of hours) byDay.set(day, (byDay.get(day) ?? 0) + productionWh);
    const may = [...byDay].filter(([day]) => day.startsWith('2026-05')).map(([, made]) => made);
    expect(Math.min(...may)).toBeLessThan(0.4 * Math.max(...may));
  });

  it('has a monitor that follows the production meter within 5 % and is silent for six days of November 2025', () => {
    const known = new Map(monitorHours().map(({ stamp, watts }) => [stamp, watts]));
    expect(known.size).toBe(monitorHours().length);
    const silent: string[] = [];
    let meter = 0;
    let monitor = 0;
    let fold = '';
    for (const { day, clock, productionWh } of hours) {
      const offsets = ['-07:00', '-08:00'].map((offset) => `${day}T${clock}:00${offset}`);
      const found = offsets.filter((stamp) => known.has(stamp) && stamp !== fold);
      const [stamp] = found;
      if (stamp === undefined) silent.push(`${day}T${clock}`);
      else {
        fold = stamp;
        meter += productionWh;
        monitor += known.get(stamp) ?? 0;
      }
    }
    expect(silent.length).toBe(139);
    expect([silent.at(0), silent.at(-1)]).toEqual(['2025-11-19T14:00', '2025-11-25T08:00']);
    expect(Math.abs(monitor - meter) / meter).toBeLessThan(0.05);
  });
});
