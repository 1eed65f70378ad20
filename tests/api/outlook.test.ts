import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { logApi } from '#shared/api/log.ts';
import { outlookApi } from '#shared/api/outlook.ts';
import { positionApi } from '#shared/api/position.ts';
import { DEFAULT_ASSUMPTIONS } from '#shared/facts/household.ts';
import { cents } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { buildHousehold } from '#tests/support/build-household.ts';
import { everyWorking } from '#tests/support/every-working.ts';
import { statementFile } from '#tests/support/paper-files.ts';
import { setUpFrom } from '#tests/support/set-up.ts';
import {
  anotherHousehold,
  failOnConsole,
  newHousehold,
  startTestServer,
  type TestHousehold,
  type TestServer,
} from '#tests/support/test-server.ts';

failOnConsole();

let server: TestServer;
let home: TestHousehold;
beforeAll(async () => {
  const facts = buildHousehold({ cycles: 14, start: day('2025-06-14') });
  server = await startTestServer();
  home = await newHousehold(server);
  setUpFrom(server, home, facts);
  const file = { fileName: 'bills.csv', bytes: statementFile(facts.statements) };
  await home.owner.call(logApi.addStatementFile, { params: home.params, file });
  await home.owner.call(logApi.post, { params: home.params, body: { replaceReadings: false } });
});
afterAll(() => server.close());

const view = async () => (await home.owner.call(outlookApi.view, { params: home.params })).value;
const position = async () => (await home.owner.call(positionApi.view, { params: home.params })).value.position;

describe('the outlook', () => {
  it('says why there is none before the first cycle', async () => {
    const empty = await anotherHousehold(server, home);
    const made = (await empty.owner.call(outlookApi.view, { params: empty.params })).value;
    expect(made).toMatchObject({ range: null, handbook: null, carbon: null, assumptions: DEFAULT_ASSUMPTIONS });
    expect(made.whyNoRange).toBe('Post the first cycle to see a projection.');
  });

  it('has workings that come to their figures, and is the same when asked again', async () => {
    const made = await view();
    const worked = everyWorking(made);
    expect(worked.length).toBeGreaterThan(5);
    expect(worked.filter((one) => !one.agrees)).toEqual([]);
    expect(await view()).toEqual(made);
  });

  it('has a range over the projection’s months, or says what it lacks', async () => {
    const { range, whyNoRange } = await view();
    const { projection } = await position();
    expect((range === null) !== (whyNoRange === null)).toBe(true);
    if (range) expect(range.months).toHaveLength(projection?.months.length ?? 0);
    else expect(whyNoRange).toContain('twelve complete cycles');
  });
});

describe('the assumptions', () => {
  const body = {
    ...DEFAULT_ASSUMPTIONS,
    priceRise: '0',
    horizonMonths: 120,
    upkeepYearlyCents: cents(12_000),
    discountRate: '0.05',
    grid: { region: 'Port Calder', lbPerMwh: '536.428', basis: 'total output', year: 2022 },
  };

  it('once changed hold for the projection and touch nothing of the record', async () => {
    const before = await position();
    const saved = await home.owner.call(outlookApi.saveAssumptions, { params: home.params, body });
    expect(saved.value.assumptions).toEqual(body);
    const after = await position();
    expect(after.projection?.months).toHaveLength(120);
    expect(after.cashSoFar).toEqual(before.cashSoFar);
    expect(after.points).toEqual(before.points);
    expect(saved.value.handbook?.discountRate ?? '0.05').toBe('0.05');
    expect(saved.value.carbon?.factor ?? body.grid).toEqual(body.grid);
    expect(await view()).toEqual(saved.value);
  });

  it('that cannot be are refused, each at its field, and nothing changes', async () => {
    const held = (await view()).assumptions;
    const wrong = {
      ...body,
      degradation: '0.2',
      priceRise: '0.5',
      discountRate: '-0.01',
      grid: { ...body.grid, lbPerMwh: '9000', year: 1800 },
    };
    const refused = await home.owner.call(outlookApi.saveAssumptions, { params: home.params, body: wrong });
    expect(refused.problem.faults.map((fault) => fault.field)).toEqual([
      'degradation',
      'priceRise',
      'discountRate',
      'grid.lbPerMwh',
      'grid.year',
    ]);
    expect((await view()).assumptions).toEqual(held);
  });
});
