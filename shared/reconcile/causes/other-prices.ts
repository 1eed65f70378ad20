import { sayDate } from '../../ledger/say.ts';
import { seasonOf } from '../../settlement/calendar.ts';
import type { RatePlan, RateRow, RatesOf, TierRow } from '../../settlement/plan.ts';
import { type Pricing, priceAt } from '../../settlement/rates-in-force.ts';
import type { CycleUsage } from '../../settlement/settlement.ts';
import { type Day, day } from '../../units/day.ts';
import { Exact } from '../../units/rate.ts';
import type { PricedItem, Prices } from './priced-items.ts';

type Said = { key: string; said: string; found: Record<string, string> };

/** Prices that someone may have taken for an item's own, and which they are. `key` is one for the same mistake in several items. */
export type OtherPrices = Prices & Said;

type Rows = { rates: RateRow[]; tiers: TierRow[] };

/** Before any day a plan speaks of. */
const ALWAYS = day('1900-01-01');
/** How many versions before and after those in force are tried. */
const VERSIONS_AROUND = 2;

/** Every neighbouring price of an item: another season's, version's, period's or tier's; for credits half of it; for shares of other rates the whole. */
export function otherPrices(plan: RatePlan, item: PricedItem, usage: CycleUsage): OtherPrices[] {
  const { rates, tiers, derived, ratesOf } = item;
  if (derived !== null && ratesOf !== null) return ofOtherCharges(plan, derived, ratesOf, usage);
  const own = { rates, tiers };
  const rows = [...rates, ...tiers];
  const seasonal = rows.some((row) => row.season !== undefined);
  return [
    ...(seasonal ? otherSeasons(plan, usage).map((id) => priced(inSeason(own, id), seasonSaid(id))) : []),
    ...(seasonal ? otherSeasons(plan, usage).flatMap((id) => inOnePeriod(own, id, periodNames(plan))) : []),
    ...versionsAround(
      rows.map((row) => row.from),
      usage,
    ).map((version) => priced(asOf(own, version.from), version.said)),
    ...swapped(own, 'period', periodNames(plan)),
    ...swapped(own, 'tier', tierNames(rates)),
    ...(item.credits ? [priced({ ...own, rates: rates.map(halved) }, HALF)] : []),
  ].filter((prices) => prices.rates.length > 0);
}

const HALF: Said = { key: 'half', said: 'half the rate', found: { price: 'half' } };

function priced({ rates, tiers }: Rows, said: Said): OtherPrices {
  return { rates, ratesOf: null, tiers, ...said };
}

function seasonSaid(season: string): Said {
  return { key: `season ${season}`, said: `the ${season} rate`, found: { price: 'season', season } };
}

/** The seasons but the one that holds all through the cycle. */
function otherSeasons({ calendar, seasonBy }: RatePlan, { from, to }: CycleUsage): string[] {
  const season = seasonOf(calendar, to);
  const whole = seasonBy === 'readDate' || seasonOf(calendar, from) === season;
  return calendar.seasons.map(({ id }) => id).filter((id) => !whole || id !== season);
}

/** Rows as they hold in one season, all year round. Of one day's rows the one that named the season stands first, as it did before. */
function inSeason({ rates, tiers }: Rows, season: string): Rows {
  return { rates: ofSeason(rates, season), tiers: ofSeason(tiers, season) };
}

/** One period's price of another season, the other periods at their own. */
function inOnePeriod({ rates, tiers }: Rows, season: string, names: Names<string>): OtherPrices[] {
  const named = names.filter(({ value }) => rates.some((row) => row.period === value && row.season === season));
  if (named.length < 2) return [];
  return named.map(({ value, name }) => {
    const other = ofSeason(
      rates.filter((row) => row.period === value),
      season,
    );
    return priced(
      { rates: [...other, ...rates.filter((row) => row.period !== value)], tiers },
      {
        key: `season ${season} in ${value}`,
        said: `the ${season} rate for ${name}`,
        found: { price: 'season', season, for: name },
      },
    );
  });
}

function ofSeason<Row extends RateRow | TierRow>(rows: readonly Row[], season: string): Row[] {
  const named = rows.filter((row) => row.season === season);
  const general = rows.filter((row) => row.season === undefined);
  return [...named.map((row) => ({ ...row, season: undefined })), ...general];
}

/** The versions next to those in force in the cycle, and those themselves where it holds more than one. */
function versionsAround(days: readonly Day[], usage: CycleUsage): { from: Day; said: Said }[] {
  const versions = [...new Set(days)].sort();
  const first = Math.max(versions.filter((from) => from <= usage.from).length - 1, 0);
  const last = Math.max(versions.filter((from) => from <= usage.to).length - 1, 0);
  return versions.flatMap((from, at) => {
    if (at < first - VERSIONS_AROUND || at > last + VERSIONS_AROUND || (at === first && at === last)) return [];
    const next = versions[at + 1];
    const said =
      next === undefined || at >= last ? `the rate from ${sayDate(from)}` : `the rate before ${sayDate(next)}`;
    return [{ from, said: { key: `version ${from}`, said, found: { price: 'version', version: from } } }];
  });
}

/** Rows in force on a day, at all times. */
function asOf({ rates, tiers }: Rows, date: Day): Rows {
  return { rates: inForce(rates, date), tiers: inForce(tiers, date) };
}

function inForce<Row extends RateRow | TierRow>(rows: readonly Row[], date: Day): Row[] {
  const latest = new Map<string, Row>();
  for (const row of rows) {
    if (row.from > date) continue;
    const key = JSON.stringify([row.season, 'rate' in row ? [row.period, row.tier] : null]);
    const known = latest.get(key);
    if (!known || row.from >= known.from) latest.set(key, row);
  }
  return [...latest.values()].map((row) => ({ ...row, from: ALWAYS }));
}

type Names<Value> = { value: Value; name: string }[];

function periodNames(plan: RatePlan): Names<string> {
  return plan.calendar.periods.map(({ id, label }) => ({ value: id, name: label === '' ? id : label }));
}

function tierNames(rates: readonly RateRow[]): Names<number> {
  const tiers = new Set(rates.flatMap((row) => (row.tier === undefined ? [] : [row.tier])));
  return [...tiers].map((value) => ({ value, name: `tier ${value}` }));
}

/** One period's (or tier's) kWh at another's price, and all at one's. */
function swapped<Value>(own: Rows, field: 'period' | 'tier', names: Names<Value>): OtherPrices[] {
  const rowsOf = (value: Value) => own.rates.filter((row) => row[field] === value);
  const priced = names.filter(({ value }) => rowsOf(value).length > 0);
  const made: OtherPrices[] = [];
  for (const taken of priced) {
    const others = priced.filter((one) => one !== taken);
    const sets = others.length > 1 ? [...others.map((one) => [one]), others] : [others];
    for (const instead of sets.filter((set) => set.length > 0)) {
      const values = instead.map(({ value }) => value);
      const kept = own.rates.filter((row) => !values.some((value) => row[field] === value));
      const copies = values.flatMap((value) => rowsOf(taken.value).map((row) => ({ ...row, [field]: value })));
      const of = instead.map(({ name }) => name).join(', ');
      made.push({
        rates: [...kept, ...copies],
        ratesOf: null,
        tiers: own.tiers,
        key: `${field} ${of}: ${taken.name}`,
        said: `the ${taken.name} rate for ${of}`,
        found: { price: field, taken: taken.name, for: of },
      });
    }
  }
  return made;
}

function halved(row: RateRow): RateRow {
  return { ...row, rate: new Exact(row.rate).div(2).toString() };
}

/** The other prices of a share of other charges' rates: pinned to another season or version, another share, another tier. */
function ofOtherCharges(plan: RatePlan, pricing: Pricing, ratesOf: RatesOf, usage: CycleUsage): OtherPrices[] {
  const { calendar } = plan;
  const season = seasonOf(calendar, usage.to);
  const at = (date: Day, inIt: string | null): Rows => ({ rates: pinned(plan, pricing, date, inIt), tiers: [] });
  const share = (change: Partial<RatesOf>, said: Said): OtherPrices => ({
    rates: [],
    ratesOf: { ...ratesOf, ...change },
    tiers: [],
    ...said,
  });
  const half = new Exact(ratesOf.fraction).div(2).toString();
  const tiers = new Set(pricing.tables.flat().flatMap((row) => row.tier ?? []));
  return [
    ...(pricing.bySeason ? otherSeasons(plan, usage).map((id) => priced(at(usage.to, id), seasonSaid(id))) : []),
    ...versionsAround(
      pricing.changes.map((change) => change.from),
      usage,
    ).map((version) => priced(at(version.from, season), version.said)),
    ...swapped(at(usage.to, season), 'period', periodNames(plan)),
    share({ fraction: half }, HALF),
    share({ fraction: '1' }, { key: 'whole', said: 'the whole rate', found: { price: 'whole' } }),
    ...[...tiers].map((tier) =>
      share(
        { tier },
        { key: `tier ${tier}`, said: `the tier ${tier} rate`, found: { price: 'tier', taken: `tier ${tier}` } },
      ),
    ),
  ].filter((prices) => prices.ratesOf !== null || prices.rates.length > 0);
}

function pinned(plan: RatePlan, pricing: Pricing, date: Day, season: string | null): RateRow[] {
  const periods = pricing.byPeriod ? plan.calendar.periods.map((period) => period.id) : [undefined];
  return periods.flatMap((period) => {
    const price = priceAt(pricing, date, season, period ?? null, null);
    return price === null ? [] : [{ from: ALWAYS, period, rate: price.rate.text }];
  });
}
