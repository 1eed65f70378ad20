import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { loadFacts } from '#server/services/load-facts.ts';
import { restoreHousehold } from '#server/services/restore-household.ts';
import { bodyOfStatement } from '#server/services/statements-in-force.ts';
import { cyclesApi } from '#shared/api/cycles.ts';
import { logApi } from '#shared/api/log.ts';
import { peopleApi } from '#shared/api/people.ts';
import { householdExport } from '#shared/facts/household.ts';
import type { Statement } from '#shared/facts/papers.ts';
import { cents } from '#shared/units/cents.ts';
import { onBudget } from '#tests/support/budget-household.ts';
import { buildHousehold } from '#tests/support/build-household.ts';
import { statementFile } from '#tests/support/paper-files.ts';
import { setUpFrom } from '#tests/support/set-up.ts';
import {
  failOnConsole,
  must,
  newHousehold,
  startTestServer,
  type TestHousehold,
  type TestServer,
} from '#tests/support/test-server.ts';

failOnConsole();

/** Three months on a budget plan, the last with water, refuse and the year's settlement, and credit sent to the barn. */
const built = buildHousehold();
const SENT = '4.50';
const lower = (text: string | null) => (text === null ? null : (Number(text) - 4.5).toFixed(2));
const facts = onBudget(
  {
    ...built,
    house: {
      ...built.house,
      aggregation: 'share',
      meters: [
        ...built.house.meters,
        { id: 'B-2', label: 'Barn meter', channels: ['import'], dials: 5, multiplier: '1', servicePoint: 'Barn' },
      ],
    },
    statements: built.statements.map((statement, at) => ({
      ...statement,
      banks: statement.banks.map((bank) => ({
        ...bank,
        close: at === 2 ? lower(bank.close) : bank.close,
        sentOut: at === 2 ? SENT : null,
        sentValueCents: at === 2 ? cents(431) : null,
      })),
    })),
  },
  (at) => ({ instalment: 11_800, ...(at === 2 ? { settled: -1250, services: { Water: 4115, Refuse: 1900 } } : {}) }),
);
const bodies = facts.statements.map(bodyOfStatement);

function bodyAt(index: number): ReturnType<typeof bodyOfStatement> {
  const found = bodies[index];
  if (found === undefined) throw new Error(`no statement ${index}`);
  return found;
}

/** A statement as a file gives it: the same values, the rows they stand in left aside. */
function withoutRows(statement: Statement): unknown {
  return JSON.parse(JSON.stringify(bodyOfStatement(statement)), (key, value: unknown) =>
    key === 'row' ? null : value,
  );
}

let server: TestServer;
let home: TestHousehold;
beforeAll(async () => {
  server = await startTestServer();
  home = await newHousehold(server);
  setUpFrom(server, home, facts);
});
afterAll(() => server.close());

const inForce = () =>
  [...(loadFacts(server.deps.db, home.id)?.facts.statements ?? [])].sort(
    (a, b) => a.to.localeCompare(b.to) || b.revision - a.revision,
  );

describe('a month on a budget plan, with other services and a shared bank', () => {
  it('is read from a file, checked and posted as it is printed', async () => {
    const { owner, params } = home;
    const bytes = statementFile(facts.statements.slice(0, 2));
    const draft = (await owner.call(logApi.addStatementFile, { params, file: { fileName: 'two.csv', bytes } })).value;
    expect(draft.statements.map((one) => one.statement.budget)).toEqual([bodyAt(0).budget, bodyAt(1).budget]);
    expect(draft.statements[1]?.checks.find((one) => one.key === 'budgetChain:')?.verdict).toBe('agrees');
    (await owner.call(logApi.post, { params, body: { replaceReadings: false } })).value;
    expect(inForce().map(withoutRows)).toEqual([bodyAt(0), bodyAt(1)]);
  });

  it('is typed; without its real charges it is refused at the lines', async () => {
    const { owner, params } = home;
    const bare = { ...bodyAt(2), lines: bodyAt(2).lines.filter((line) => line.kind === 'otherService') };
    const refused = await owner.call(logApi.addStatement, { params, body: { statement: bare } });
    expect(refused.problem.code).toBe('invalid-fields');
    expect(refused.problem.faults?.map((fault) => fault.message)).toEqual([
      'With a budget amount, add the real charges as lines: the amount due does not say them.',
    ]);
    const draft = (await owner.call(logApi.addStatement, { params, body: { statement: bodyAt(2) } })).value;
    expect(draft.statements[0]?.checks.filter((one) => one.verdict === 'differs')).toEqual([]);
    (await owner.call(logApi.post, { params, body: { replaceReadings: false } })).value;
    expect(inForce().map(withoutRows)).toEqual([bodyAt(0), bodyAt(1), bodyAt(2)]);
  });

  it('is corrected by a revision; the first stays readable with what it said', async () => {
    const { owner, params } = home;
    const { budget, ...body } = bodyAt(2);
    if (budget === null) throw new Error('the built month is on a budget plan');
    const wrong = { ...budget, balanceCents: cents((budget.balanceCents ?? 0) + 900) };
    const to = { ...params, to: body.to };
    const reason = 'The balance was misread.';
    (await owner.call(cyclesApi.correct, { params: to, body: { statement: { ...body, budget: wrong }, reason } }))
      .value;
    const view = (await owner.call(cyclesApi.one, { params: to })).value;
    expect(view.cycle.statement).toMatchObject({ revision: 2, budget: wrong });
    expect(view.revisions.map((one) => one.budget)).toEqual([budget]);
    expect(view.cycle.checks.find((one) => one.key === 'budgetChain:')).toMatchObject({
      verdict: 'differs',
      difference: '9.00',
    });
  });

  it('goes out with the full export and restores the same, meters’ places and aggregation too', async () => {
    const { owner, params } = home;
    const exported = householdExport.parse(JSON.parse((await owner.call(peopleApi.exportHousehold, { params })).text));
    expect(exported.facts.house.aggregation).toBe('share');
    expect(exported.facts.house.meters.map((meter) => meter.servicePoint)).toEqual([null, null, 'Barn']);
    const user = { id: owner.userId, name: 'Priya' };
    const { id } = must(restoreHousehold(server.deps, user, JSON.parse(JSON.stringify(exported))));
    expect(loadFacts(server.deps.db, id)?.facts).toEqual(exported.facts);
  });
});
