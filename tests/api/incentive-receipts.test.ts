import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { cyclesApi } from '#shared/api/cycles.ts';
import { logApi } from '#shared/api/log.ts';
import { moneyApi } from '#shared/api/money.ts';
import { cents } from '#shared/units/cents.ts';
import { type Day, day } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { buildHousehold } from '#tests/support/build-household.ts';
import { statementFile } from '#tests/support/paper-files.ts';
import { setUpFrom } from '#tests/support/set-up.ts';
import {
  failOnConsole,
  newHousehold,
  startTestServer,
  type TestHousehold,
  type TestServer,
} from '#tests/support/test-server.ts';

failOnConsole();

const facts = buildHousehold({ cycles: 3 });
let server: TestServer;
let home: TestHousehold;
beforeAll(async () => {
  server = await startTestServer();
  home = await newHousehold(server);
  const { incentive } = facts;
  setUpFrom(server, home, { ...facts, incentive: incentive && { ...incentive, received: [] } });
  await home.owner.call(logApi.addStatementFile, {
    params: home.params,
    file: { fileName: 'summer.csv', bytes: statementFile(facts.statements) },
  });
  await home.owner.call(logApi.post, { params: home.params, body: { replaceReadings: false } });
});
afterAll(() => server.close());

function record(from: Day | null, to: Day | null) {
  const body = {
    on: day('2025-09-01'),
    amountCents: cents(12_915),
    note: null,
    quantityWh: wh(2_870_000),
    documentId: null,
  };
  return home.owner.call(moneyApi.addReceipt, { params: home.params, body: { ...body, from, to } });
}

describe('a receipt of the incentive', () => {
  it.each([
    [day('2025-06-14'), null, 'to'],
    [null, day('2025-08-14'), 'from'],
    [day('2025-08-14'), day('2025-08-14'), 'to'],
  ])('that covers %s to %s is refused beside the field', async (from, to, field) => {
    const answer = await record(from, to);
    expect([answer.status, answer.problem.faults[0]?.field]).toEqual([400, field]);
  });

  it('says which days and kWh it pays, pays those cycles, and is checked in the cycle they end in', async () => {
    const money = (await record(day('2025-06-14'), day('2025-08-14'))).value;
    expect(money.incentive?.facts.received[0]).toMatchObject({
      from: '2025-06-14',
      to: '2025-08-14',
      quantityWh: 2_870_000,
    });
    expect(money.incentive?.cycles.map((cycle) => cycle.owedCents)).toEqual([0, 0, 5895]);
    expect(money.incentive?.cycles[1]?.paidBy).toMatchObject([{ on: '2025-09-01', amountCents: 6525, stated: true }]);
    const params = { ...home.params, to: '2025-08-14' };
    const { cycle } = (await home.owner.call(cyclesApi.one, { params })).value;
    const own = cycle.checks.filter((check) => check.check.startsWith('incentive'));
    expect(own.map((check) => [check.check, check.verdict])).toEqual([
      ['incentiveQuantity', 'agrees'],
      ['incentivePaid', 'agrees'],
    ]);
  });
});
