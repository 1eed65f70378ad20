import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { addPaper } from '#server/services/credit/papers.ts';
import { bodyOfStatement } from '#server/services/statements-in-force.ts';
import { creditApi } from '#shared/api/credit.ts';
import { cyclesApi } from '#shared/api/cycles.ts';
import { logApi } from '#shared/api/log.ts';
import { moneyApi } from '#shared/api/money.ts';
import { peopleApi } from '#shared/api/people.ts';
import { positionApi } from '#shared/api/position.ts';
import { sessionApi } from '#shared/api/session.ts';
import { setupApi } from '#shared/api/setup.ts';
import { buildHousehold } from '#tests/support/build-household.ts';
import { statementFile } from '#tests/support/paper-files.ts';
import { setUpFrom } from '#tests/support/set-up.ts';
import {
  failOnConsole,
  must,
  newHousehold,
  PASSWORD,
  startTestServer,
  type TestHousehold,
  type TestServer,
} from '#tests/support/test-server.ts';

failOnConsole();

let server: TestServer;
let ours: TestHousehold;
let theirs: TestHousehold;
const facts = buildHousehold({ cycles: 2 });

beforeAll(async () => {
  server = await startTestServer();
  ours = await newHousehold(server, 'Priya');
  theirs = await newHousehold(server, 'Bertrand', '4 Gull Court');
  for (const household of [ours, theirs]) {
    setUpFrom(server, household, facts);
    await household.owner.call(logApi.addStatementFile, {
      params: household.params,
      file: { fileName: `${household.actor.name}.csv`, bytes: statementFile(facts.statements.slice(0, 1)) },
    });
    await household.owner.call(logApi.post, { params: household.params, body: { replaceReadings: false } });
    must(
      addPaper(server.deps, household.actor, {
        fileName: `${household.actor.name}.pdf`,
        bytes: Buffer.from(`%PDF-1.7 ${household.actor.name}`),
      }),
    );
  }
  const cost = { on: '2025-08-01', kind: 'repair', label: 'Bertrand’s repair', amountCents: 12_300 };
  await theirs.owner.call(moneyApi.addCost, { params: theirs.params, body: cost as never });
});
afterAll(() => server.close());

describe('two households in one database', () => {
  it('the same file may be posted in both, and each sees only its own', async () => {
    const reads = [
      setupApi.view,
      cyclesApi.list,
      positionApi.view,
      moneyApi.view,
      creditApi.view,
      peopleApi.list,
      logApi.draft,
    ];
    for (const read of reads) {
      const answer = await ours.owner.call(read as typeof setupApi.view, { params: ours.params });
      expect(answer.status).toBe(200);
      expect(answer.text).not.toMatch(/Bertrand|Gull/);
    }
    const cycle = await ours.owner.call(cyclesApi.one, {
      params: { ...ours.params, to: facts.statements[0]?.to ?? '' },
    });
    expect(cycle.text).not.toMatch(/Bertrand/);
    const download = await ours.owner.call(peopleApi.exportHousehold, { params: ours.params });
    expect(download.text).not.toMatch(/Bertrand|Gull/);
  });

  it('an id of the other household’s row is unknown here, and the row stays', async () => {
    const { costs } = (await theirs.owner.call(moneyApi.view, { params: theirs.params })).value;
    const repair = costs.find(({ kind }) => kind === 'repair');
    const removed = await ours.owner.call(moneyApi.removeCost, { params: { ...ours.params, id: repair?.id ?? '' } });
    expect(removed.status).toBe(404);
    const after = (await theirs.owner.call(moneyApi.view, { params: theirs.params })).value.costs;
    expect(after).toContainEqual(repair);
    const { papers } = (await theirs.owner.call(creditApi.view, { params: theirs.params })).value;
    const paper = await ours.owner.call(creditApi.paper, {
      params: { ...ours.params, documentId: papers[0]?.id ?? '' },
    });
    expect(paper.status).toBe(404);
    const removedPerson = await ours.owner.call(peopleApi.remove, {
      params: { ...ours.params, userId: theirs.owner.userId },
    });
    expect(removedPerson.status).toBe(404);
  });
});

describe('what a tax preparer is given', () => {
  it('is the credit and nothing of the house, the bills or the loan', async () => {
    const preparer = await ours.person('Marisol', 'preparer');
    const { value } = await preparer.call(creditApi.view, { params: ours.params });
    expect(Object.keys(value).sort()).toEqual([
      'basis',
      'checks',
      'credit',
      'earnedCents',
      'forms',
      'lines',
      'papers',
      'plan',
      'receivedCents',
      'stillToCarryCents',
      'undated',
      'usedCents',
      'vintages',
    ]);
    expect(Object.keys(value.credit ?? {}).sort()).toEqual([
      'carriedIn',
      'costs',
      'homeShare',
      'placedInServiceOn',
      'years',
    ]);
    expect(value.papers.map(({ fileName }) => fileName)).toEqual(['Priya.pdf']);
    const paper = await preparer.call(creditApi.paper, {
      params: { ...ours.params, documentId: value.papers[0]?.id ?? '' },
    });
    expect(paper.text).toBe('%PDF-1.7 Priya');
    const statement = server.deps.sqlite
      .prepare("SELECT id FROM documents WHERE household_id = ? AND kind = 'statement'")
      .pluck()
      .get(ours.id);
    const documentId = String(statement);
    expect((await preparer.call(creditApi.paper, { params: { ...ours.params, documentId } })).status).toBe(404);
    expect((await ours.owner.call(creditApi.paper, { params: { ...ours.params, documentId } })).status).toBe(200);
    expect((await preparer.call(creditApi.summaryCsv, { params: ours.params })).status).toBe(200);
    expect((await preparer.call(creditApi.summaryPdf, { params: ours.params })).status).toBe(200);
    const session = (await preparer.call(sessionApi.current)).value;
    expect(session?.households).toEqual([{ id: ours.id, name: '12 Tern Lane', role: 'preparer' }]);
  });
});

describe('fields that a caller cannot set', () => {
  it.each([
    [
      'a role of one’s own at sign-up',
      sessionApi.signUp,
      { name: 'E', email: 'eve@example.org', password: PASSWORD, role: 'owner' },
      'role',
    ],
    [
      'a household at sign-in',
      sessionApi.signIn,
      { email: 'priya@example.org', password: PASSWORD, householdId: 'x' },
      'householdId',
    ],
    ['an id for a new household', setupApi.create, { name: 'H', timeZone: 'UTC', id: 'mine' }, 'id'],
    [
      'who typed a limit',
      creditApi.putYear,
      { limitCents: 1, status: 'planned', filedOn: null, refundOn: null, asRefund: true, typedBy: 'Nobody' },
      'typedBy',
    ],
    [
      'the id of a payment',
      moneyApi.addLoanPayment,
      { on: '2025-09-01', amountCents: 1, extraPrincipalCents: 0, note: null, id: 'x' },
      'id',
    ],
    [
      'the id of a cost',
      moneyApi.addCost,
      { on: '2025-09-01', kind: 'repair', label: 'x', amountCents: 1, id: 'x' },
      'id',
    ],
    [
      'a revision of a statement',
      logApi.addStatement,
      { statement: { ...bodyOfStatement(facts.statements[1] as never), revision: 7 } },
      'statement.revision',
    ],
  ])('%s', async (_what, endpoint, body, field) => {
    const answer = await ours.owner.call(endpoint as typeof sessionApi.signUp, {
      params: { ...ours.params, taxYear: '2025' },
      body: body as never,
    });
    expect(answer.status).toBe(400);
    expect(answer.problem.code).toBe('invalid-fields');
    expect(answer.problem.faults).toContainEqual(
      expect.objectContaining({ field, message: 'This field is not known here.' }),
    );
  });

  it('a faulty form names each field by its path, in a sentence', async () => {
    const answer = await ours.owner.call(setupApi.loan, {
      params: ours.params,
      body: {
        loan: {
          lender: 'L',
          principalCents: 0,
          dealerFeeCents: 0,
          annualRate: 'six',
          termMonths: 180,
          fundedOn: '2025-02-30',
          firstPaymentOn: '2025-03-01',
        },
      } as never,
    });
    expect(answer.status).toBe(400);
    expect(answer.problem.faults.map(({ field }) => field)).toEqual([
      'loan.principalCents',
      'loan.annualRate',
      'loan.fundedOn',
    ]);
    for (const { message } of answer.problem.faults) expect(message).toMatch(/\w+ \w+/);
  });
});
