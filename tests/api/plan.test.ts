import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { cyclesApi } from '#shared/api/cycles.ts';
import { logApi } from '#shared/api/log.ts';
import { planApi } from '#shared/api/plan.ts';
import { setupApi } from '#shared/api/setup.ts';
import type { RatePlan } from '#shared/settlement/plan.ts';
import { day } from '#shared/units/day.ts';
import { buildHousehold } from '#tests/support/build-household.ts';
import { everyWorking } from '#tests/support/every-working.ts';
import { statementFile } from '#tests/support/paper-files.ts';
import { setUpFrom } from '#tests/support/set-up.ts';
import {
  failOnConsole,
  newHousehold,
  startTestServer,
  type TestClient,
  type TestHousehold,
  type TestServer,
} from '#tests/support/test-server.ts';
import { FUEL, withFuel } from '#tests/support/with-fuel.ts';

failOnConsole();

const facts = buildHousehold({ cycles: 14 });
let server: TestServer;
let home: TestHousehold;
let member: TestClient;
let empty: TestHousehold;

beforeAll(async () => {
  server = await startTestServer();
  home = await newHousehold(server);
  setUpFrom(server, home, facts);
  await home.owner.call(logApi.addStatementFile, {
    params: home.params,
    file: { fileName: 'all.csv', bytes: statementFile(facts.statements) },
  });
  await home.owner.call(logApi.post, { params: home.params, body: { replaceReadings: false } });
  member = await home.person('Jonah', 'member');
  empty = await newHousehold(server, 'Bertrand', '4 Gull Court');
});
afterAll(() => server.close());

function presentPlan(): RatePlan {
  const plan = facts.plans[0]?.plan;
  if (!plan) throw new Error('the household has a plan');
  return plan;
}

/** The present plan with every price of the energy charge changed. */
function withEnergyAt(rate: string, from = '2025-01-01'): RatePlan {
  const plan = presentPlan();
  return {
    ...plan,
    charges: plan.charges.map((charge) =>
      charge.id === 'energy' ? { ...charge, rates: [{ from: day(from), rate }] } : charge,
    ),
  };
}

const evening: Partial<RatePlan> = {
  calendar: {
    seasons: [],
    periods: [
      { id: 'peak', label: 'Peak', when: [{ days: 'weekday', from: '16:00', to: '21:00' }] },
      { id: 'rest', label: 'Other', when: 'rest' },
    ],
    holidays: null,
  },
};

function byPeriod(): RatePlan {
  const plan = presentPlan();
  const from = day('2025-01-01');
  const rates = [
    { from, period: 'peak', rate: '0.30' },
    { from, period: 'rest', rate: '0.10' },
  ];
  return {
    ...plan,
    ...evening,
    charges: plan.charges.map((charge) => (charge.id === 'energy' ? { ...charge, rates } : charge)),
  };
}

const example = async (client: TestClient, params: Record<string, string>, plan: unknown, to: string | null = null) =>
  (await client.call(planApi.example, { params, body: { plan, to: to === null ? null : day(to) } })).value;
const trial = async (plan: unknown, cycles: 'year' | 'all' = 'year') =>
  (await home.owner.call(planApi.trial, { params: home.params, body: { plan, cycles } })).value;

describe('an example month', () => {
  it('is worked on the house’s last cycle, with every line’s working', async () => {
    const seen = await example(home.owner, home.params, presentPlan());
    const last = facts.statements.at(-1);
    expect(seen.usage).toMatchObject({ source: 'cycle', from: last?.from, to: last?.to, sharedEvenly: false });
    expect(seen.settlement?.lines.length).toBeGreaterThan(3);
    expect(seen.faults).toEqual([]);
    const workings = everyWorking(seen.settlement);
    expect(workings.length).toBeGreaterThan(3);
    expect(workings.filter(({ agrees }) => !agrees)).toEqual([]);
  });

  it('is worked on another of its cycles when asked', async () => {
    const third = facts.statements[2 + 2];
    const seen = await example(home.owner, home.params, presentPlan(), third?.to);
    expect(seen.usage).toMatchObject({ from: third?.from, to: third?.to });
    expect(seen.cycles).toHaveLength(12);
  });

  it('is worked on a made-up month where the house has none yet', async () => {
    const seen = await example(empty.owner, empty.params, presentPlan());
    expect(seen.usage).toMatchObject({
      source: 'invented',
      importWh: 600_000,
      exportWh: 400_000,
      productionWh: 700_000,
    });
    expect(seen.cycles).toEqual([]);
    const energy = seen.settlement?.lines.find((line) => line.component === 'energy');
    expect(energy?.quantity).toBe('600');
  });

  it('shares the kWh evenly over periods no reading tells apart, and says so', async () => {
    const seen = await example(home.owner, home.params, byPeriod());
    expect(seen.usage.sharedEvenly).toBe(true);
    const lines = seen.settlement?.lines.filter((line) => line.component === 'energy') ?? [];
    expect(lines.map((line) => line.period)).toEqual(['peak', 'rest']);
    expect(lines[0]?.quantity).toBe(lines[1]?.quantity);
  });

  it('says in words what is wrong with a plan, and where', async () => {
    const plan = presentPlan();
    const broken = { ...plan, banks: plan.banks.map((bank) => ({ ...bank, offsets: ['nothing'] })) };
    const seen = await example(home.owner, home.params, broken);
    expect(seen.settlement).toBeNull();
    expect(seen.faults[0]?.field).toMatch(/^banks\.0\./);
    expect(seen.faults[0]?.message).toMatch(/nothing/);
    expect((await example(home.owner, home.params, 'not a plan')).faults.length).toBeGreaterThan(0);
  });

  it('takes prices that begin later back to the cycle, and says so', async () => {
    const seen = await example(home.owner, home.params, withEnergyAt('0.2', '2030-01-01'));
    expect(seen.pricesTakenBack).toBe(true);
    expect(seen.settlement?.lines.find((line) => line.component === 'energy')?.rate).toBe('0.2');
  });
});

describe('a trial of another plan', () => {
  it('of the present plan over the whole record comes to what the ledger has, cycle by cycle', async () => {
    const { rows, totals } = await trial(presentPlan(), 'all');
    expect(rows.map((row) => row.trial?.amountCents)).toEqual(rows.map((row) => row.present?.amountCents));
    expect(totals?.difference.amountCents).toBe(0);
    expect(totals?.cycles).toBe(14);
  });

  it('of the last year begins with an empty bank, so that the first bill without last year’s credit is no lower', async () => {
    const { rows } = await trial(presentPlan());
    expect(rows).toHaveLength(12);
    expect(rows[0]?.trial?.amountCents).toBeGreaterThan(rows[0]?.present?.amountCents ?? 0);
  });

  it('costs more where energy costs more, by the kWh bought and the tax on them', async () => {
    const cheap = await trial(withEnergyAt('0.10'));
    const dear = await trial(withEnergyAt('0.30'));
    expect(dear.totals?.trial.amountCents).toBeGreaterThan(cheap.totals?.trial.amountCents ?? 0);
    expect(dear.totals?.billed.amountCents).toBe(cheap.totals?.billed.amountCents);
  });

  it('bills stand beside as billed, and every figure’s working holds', async () => {
    const seen = await trial(presentPlan(), 'all');
    expect(seen.rows).toHaveLength(14);
    const { cycle } = (await home.owner.call(cyclesApi.one, { params: { ...home.params, to: seen.rows[3]?.to ?? '' } }))
      .value;
    expect(seen.rows[3]?.billedCents).toBe(cycle.asItWas.amountCents);
    const workings = everyWorking(seen);
    expect(workings.length).toBeGreaterThan(28);
    expect(workings.filter(({ agrees }) => !agrees)).toEqual([]);
  });

  it('a plan by periods says for each cycle which readings are missing, and guesses nothing', async () => {
    const seen = await trial(byPeriod());
    for (const row of seen.rows) {
      expect(row.trial).toBeNull();
      expect(row.why).toMatch(/period|interval/i);
    }
    expect(seen.totals).toBeNull();
  });

  it('a plan that cannot hold is refused with every fault', async () => {
    const answer = await home.owner.call(planApi.trial, {
      params: home.params,
      body: { plan: { ...presentPlan(), timeZone: 'Nowhere/Else' }, cycles: 'year' },
    });
    expect(answer.status).toBe(422);
    expect(answer.problem.code).toBe('plan-invalid');
    expect(answer.problem.faults[0]?.field).toBe('timeZone');
  });

  it('a house without a cycle has nothing to try it on', async () => {
    const answer = await empty.owner.call(planApi.trial, {
      params: empty.params,
      body: { plan: presentPlan(), cycles: 'all' },
    });
    expect(answer.value).toMatchObject({ rows: [], totals: null });
  });
});

describe('a trial where a rider is read from the bills', () => {
  const fuelled = withFuel();
  const own = fuelled.plans[0]?.plan;
  let house: TestHousehold;
  beforeAll(async () => {
    house = await newHousehold(server, 'Orla', '9 Knot Row');
    setUpFrom(server, house, fuelled);
    await house.owner.call(logApi.addStatementFile, {
      params: house.params,
      file: { fileName: 'all.csv', bytes: statementFile(fuelled.statements) },
    });
    await house.owner.call(logApi.post, { params: house.params, body: { replaceReadings: false } });
  });
  const tried = async (change: (charge: RatePlan['charges'][number]) => RatePlan['charges'][number]) => {
    if (!own) throw new Error('the household has a plan');
    const plan = { ...own, charges: own.charges.map((charge) => (charge.id === 'fuel' ? change(charge) : charge)) };
    return (await house.owner.call(planApi.trial, { params: house.params, body: { plan, cycles: 'all' } })).value;
  };

  it('of the present plan comes to what was billed, each cycle at its own printed price', async () => {
    const seen = await tried((charge) => charge);
    expect(seen.rows.map((row) => row.trial?.amountCents)).toEqual(seen.rows.map((row) => row.billedCents));
    expect(seen.riders).toEqual([{ label: 'Fuel rider', asPrinted: FUEL.length, cycles: FUEL.length }]);
  });

  it('of a plan whose rider has another id takes the rider of the same name', async () => {
    const seen = await tried((charge) => ({ ...charge, id: 'powerCost', label: 'Fuel Rider' }));
    expect(seen.totals?.difference.amountCents).toBe(0);
    expect(seen.riders[0]?.asPrinted).toBe(FUEL.length);
  });

  it('of a plan whose rider no bill prints uses the price written in it, and says so', async () => {
    const seen = await tried((charge) => ({ ...charge, id: 'powerCost', label: 'Power cost' }));
    expect(seen.riders).toEqual([{ label: 'Power cost', asPrinted: 0, cycles: FUEL.length }]);
    const kwh = fuelled.statements.map((statement) => Number(statement.importWh) / 1000);
    const own = (price: number) => kwh.map((one, at) => Math.round((one * (price || (FUEL[at] ?? 0))) / 100));
    const sum = (parts: number[]) => parts.reduce((all, one) => all + one, 0);
    expect(seen.totals?.difference.amountCents).toBe(sum(own(100)) - sum(own(0)));
  });

  it('of a plan that fixes the price keeps to it, and speaks of no rider', async () => {
    const seen = await tried((charge) => ({ ...charge, learned: false }));
    expect(seen.riders).toEqual([]);
    expect(seen.rows.map((row) => row.trial?.amountCents)).not.toEqual(seen.rows.map((row) => row.billedCents));
  });
});

describe('who may try', () => {
  it('a member may, and nothing is stored by it', async () => {
    const plans = (await home.owner.call(setupApi.view, { params: home.params })).value.plans;
    const before = server.deps.sqlite.prepare('SELECT total_changes()').pluck().get();
    await example(member, home.params, withEnergyAt('0.5'));
    const answer = await member.call(planApi.trial, {
      params: home.params,
      body: { plan: withEnergyAt('0.5'), cycles: 'all' },
    });
    expect(answer.status).toBe(200);
    expect(server.deps.sqlite.prepare('SELECT total_changes()').pluck().get()).toBe(before);
    expect((await home.owner.call(setupApi.view, { params: home.params })).value.plans).toEqual(plans);
    const saved = await member.call(setupApi.plan, { params: home.params, body: { plans, opening: facts.opening } });
    expect(saved.status).toBe(403);
  });

  it('a preparer may not, and the owner of another house finds nothing', async () => {
    const preparer = await home.person('Marisol', 'preparer');
    const body = { plan: presentPlan(), cycles: 'year' as const };
    expect((await preparer.call(planApi.trial, { params: home.params, body })).status).toBe(403);
    const stranger = await empty.owner.call(planApi.trial, { params: home.params, body });
    expect(stranger.status).toBe(404);
    expect(stranger.text).not.toMatch(/Tern|Harrow/);
  });
});
