import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { inTransaction } from '#server/db/client.ts';
import { readScenarios } from '#server/db/facts/read-money.ts';
import { replaceScenarios } from '#server/db/facts/write-money.ts';
import { logApi } from '#shared/api/log.ts';
import { positionApi } from '#shared/api/position.ts';
import { tryApi } from '#shared/api/try.ts';
import { leversSchema } from '#shared/facts/scenario.ts';
import { tryLevers } from '#shared/try/try-levers.ts';
import { cents } from '#shared/units/cents.ts';
import { addMonths, day } from '#shared/units/day.ts';
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

const facts = buildHousehold({ cycles: 13 });
const NONE = leversSchema.parse({});
let server: TestServer;
let home: TestHousehold;
beforeAll(async () => {
  server = await startTestServer();
  home = await newHousehold(server);
});
afterAll(() => server.close());

describe('try a change', () => {
  it('says why there is nothing to try before the first cycle', async () => {
    const view = (await home.owner.call(tryApi.view, { params: home.params })).value;
    expect(view.basis).toBeNull();
    expect(view.why).toBe('Post the first cycle to see a projection.');
  });

  it('hands out what gives the same projection in the browser as on the server, and no readings', async () => {
    setUpFrom(server, home, facts);
    await home.owner.call(logApi.addStatementFile, {
      params: home.params,
      file: { fileName: 'year.csv', bytes: statementFile(facts.statements) },
    });
    await home.owner.call(logApi.post, { params: home.params, body: { replaceReadings: false } });
    const sent = (await home.owner.call(tryApi.view, { params: home.params })).value;
    const { position } = (await home.owner.call(positionApi.view, { params: home.params })).value;
    if (sent.basis === null) throw new Error('thirteen cycles can be projected');
    const tried = tryLevers({ basis: sent.basis, hourly: sent.hourly }, NONE);
    expect(tried.ok ? tried.outcome.months : null).toEqual(position.projection?.months);
    expect(tried.ok ? tried.outcome.evenOn : 'refused').toBe(position.projection?.evenOn);
    expect(JSON.stringify(sent)).not.toContain('"intervals":[');
  });

  it('keeps a change by name, changes it, refuses its name twice, and forgets it', async () => {
    const on = addMonths((await home.owner.call(tryApi.view, { params: home.params })).value.today, 3);
    const levers = { ...NONE, paydown: { on, amountCents: cents(100_000), reamortize: true } };
    const keep = (id: string, name: string) =>
      home.owner.call(tryApi.keep, { params: { ...home.params, id }, body: { name, levers } });
    const kept = (await keep('one', 'Credit into the loan')).value;
    expect(kept.scenarios).toMatchObject([{ id: 'one', name: 'Credit into the loan', levers }]);
    expect((await keep('one', 'Credit in')).value.scenarios.map(({ name }) => name)).toEqual(['Credit in']);
    const twice = await keep('two', 'credit IN');
    expect(twice.problem.faults[0]?.field).toBe('name');
    expect((await keep('two', '   ')).problem.faults[0]?.field).toBe('name');
    const remove = (id: string) => home.owner.call(tryApi.remove, { params: { ...home.params, id } });
    expect((await remove('two')).status).toBe(404);
    expect((await remove('one')).value.scenarios).toEqual([]);
  });

  it('keeps twenty and no more, and leaves them as they are', async () => {
    const twenty = Array.from({ length: 20 }, (_, at) => ({
      id: `n${at}`,
      name: `Change ${at}`,
      levers: NONE,
      createdOn: day('2026-01-01'),
    }));
    inTransaction(server.deps.db, (tx) => replaceScenarios(tx, home.id, twenty));
    const more = await home.owner.call(tryApi.keep, {
      params: { ...home.params, id: 'more' },
      body: { name: 'One more', levers: NONE },
    });
    expect(more.status).toBe(409);
    expect(readScenarios(server.deps.db, home.id)).toHaveLength(20);
  });
});
