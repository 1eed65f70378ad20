import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { bodyOfStatement } from '#server/services/statements-in-force.ts';
import { cyclesApi } from '#shared/api/cycles.ts';
import { logApi } from '#shared/api/log.ts';
import { positionApi } from '#shared/api/position.ts';
import type { Statement } from '#shared/facts/papers.ts';
import { cents } from '#shared/units/cents.ts';
import { addDays, day } from '#shared/units/day.ts';
import { buildHousehold } from '#tests/support/build-household.ts';
import { intervalFile, statementFile } from '#tests/support/paper-files.ts';
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

const facts = buildHousehold({ cycles: 4, intervals: { channels: ['production', 'import', 'export'], minutes: 60 } });
const channelDays = (channel: string, from: string, to: string) =>
  facts.intervals.filter((found) => found.channel === channel && found.day >= from && found.day < to);

function statement(index: number): Statement {
  const found = facts.statements[index];
  if (found === undefined) throw new Error(`no statement ${index}`);
  return found;
}

let server: TestServer;
let owner: TestHousehold;
beforeAll(async () => {
  server = await startTestServer();
  owner = await newHousehold(server);
});
afterAll(() => server.close());

/** A household set up and ready for its first month. */
async function ready(): Promise<TestHousehold> {
  const household = await anotherHousehold(server, owner);
  setUpFrom(server, household, facts);
  return household;
}

const changes = () => server.deps.sqlite.prepare('SELECT total_changes()').pluck().get();

function upload(household: TestHousehold, fileName: string, bytes: string | Uint8Array) {
  return household.owner.call(logApi.addStatementFile, { params: household.params, file: { fileName, bytes } });
}
function uploadReadings(
  household: TestHousehold,
  fileName: string,
  bytes: string | Uint8Array,
  channel = 'production',
) {
  return household.owner.call(logApi.addProductionFile, {
    params: household.params,
    file: { fileName, bytes },
    fields: { channel },
  });
}
function post(household: TestHousehold, replaceReadings = false) {
  return household.owner.call(logApi.post, { params: household.params, body: { replaceReadings } });
}
async function cyclesOf(household: TestHousehold) {
  return (await household.owner.call(cyclesApi.list, { params: household.params })).value.rows;
}

describe('logging a month', () => {
  it('reads a statement and a production file, checks them, posts them and moves the position', async () => {
    const home = await ready();
    const first = statement(0);
    const read = (await upload(home, 'june.csv', statementFile([first]))).value;
    expect(read.files.map((file) => file.fileName)).toEqual(['june.csv']);
    expect(read.statements).toHaveLength(1);
    const [drafted] = read.statements;
    expect(drafted?.statement.amountDueCents).toBe(first.amountDueCents);
    expect(drafted?.edited).toBe(false);
    expect(drafted?.checks.length).toBeGreaterThan(5);
    expect(drafted?.facing.length).toBeGreaterThan(3);
    expect(read.ready).toBe(true);
    expect(await cyclesOf(home)).toEqual([]);

    const both = (
      await uploadReadings(home, 'production.csv', intervalFile(channelDays('production', first.from, first.to)))
    ).value;
    expect(both.readings).toHaveLength(1);
    expect(both.readings[0]).toMatchObject({
      firstDay: first.from,
      lastDay: addDays(first.to, -1),
      totalWh: first.productionWh,
      rejectedRows: 0,
      keepGoodRows: false,
      overlap: { sameDays: 0, differentDays: [] },
    });

    const before = (await home.owner.call(positionApi.view, { params: home.params })).value;
    const posted = (await post(home)).value;
    expect(posted.cycles).toHaveLength(1);
    expect(posted.cycles[0]).toMatchObject({ from: first.from, to: first.to, billedDueCents: first.amountDueCents });
    expect(posted.readingsDays).toEqual({ production: 30 });
    expect(posted.settledBeforeCents).toBe(before.position.settledToday.amountCents);
    const after = (await home.owner.call(positionApi.view, { params: home.params })).value;
    expect(after.position.settledToday.amountCents).toBe(posted.settledAfterCents);
    expect(posted.cashAfterCents).not.toBe(posted.cashBeforeCents);
    expect(after.counts.cycles).toBe(1);
    expect((await home.owner.call(logApi.draft, { params: home.params })).value).toMatchObject({
      files: [],
      statements: [],
      readings: [],
    });
  });

  it('posts the same facts whether a statement is typed or read', async () => {
    const typed = await ready();
    const read = await ready();
    for (const one of [statement(0), statement(1)]) {
      await typed.owner.call(logApi.addStatement, { params: typed.params, body: { statement: bodyOfStatement(one) } });
    }
    await upload(read, 'two.csv', statementFile([statement(0), statement(1)]));
    expect((await post(typed)).value.settledAfterCents).toBe((await post(read)).value.settledAfterCents);
    expect((await cyclesOf(typed)).map((row) => row.addedCents)).toEqual(
      (await cyclesOf(read)).map((row) => row.addedCents),
    );
  });

  it('takes a back-log of several cycles in one file, in one posting', async () => {
    const home = await ready();
    expect((await upload(home, 'all.csv', statementFile(facts.statements))).value.statements).toHaveLength(4);
    expect((await post(home)).value.cycles.map((cycle) => cycle.to)).toEqual(facts.statements.map(({ to }) => to));
  });

  it('keeps what the owner changed, says so, and knows that it no longer stands in the file', async () => {
    const home = await ready();
    const { statements } = (await upload(home, 'june.csv', statementFile([statement(0)]))).value;
    const [drafted] = statements;
    if (drafted === undefined) throw new Error('nothing was read');
    const changed = {
      ...drafted.statement,
      amountDueCents: cents(drafted.statement.amountDueCents + 100),
      lines: drafted.statement.lines.map((line, index) =>
        index === 0 ? { ...line, amountCents: cents(line.amountCents + 100) } : line,
      ),
    };
    const after = await home.owner.call(logApi.changeStatement, {
      params: { ...home.params, key: drafted.key },
      body: { statement: changed },
    });
    expect(after.value.statements[0]).toMatchObject({
      edited: true,
      statement: { amountDueCents: changed.amountDueCents },
    });
    await post(home);
    const { cycle } = (await home.owner.call(cyclesApi.one, { params: { ...home.params, to: drafted.statement.to } }))
      .value;
    expect(cycle.statement.lines[0]?.row).toBeNull();
    expect(cycle.statement.lines[1]?.row).not.toBeNull();
    expect(cycle.statement.source.kind).toBe('file');
    expect(cycle.statement.reason).toMatch(/changed by hand/);
  });

  it('a file of the log survives until it is removed or discarded', async () => {
    const home = await ready();
    await upload(home, 'june.csv', statementFile([statement(0)]));
    const { files } = (await home.owner.call(logApi.draft, { params: home.params })).value;
    const [file] = files;
    const removed = await home.owner.call(logApi.removeFile, {
      params: { ...home.params, documentId: file?.documentId ?? '' },
    });
    expect(removed.value).toMatchObject({ files: [], statements: [] });
    // Removed is gone: the same file may come again.
    expect((await upload(home, 'june.csv', statementFile([statement(0)]))).status).toBe(200);
    expect((await home.owner.call(logApi.discard, { params: home.params })).value.files).toEqual([]);
    expect(
      server.deps.sqlite
        .prepare("SELECT count(*) FROM documents WHERE household_id = ? AND state = 'held'")
        .pluck()
        .get(home.id),
    ).toBe(0);
  });

  it('says which production is missing', async () => {
    const home = await ready();
    const bare = {
      ...bodyOfStatement(statement(0)),
      productionWh: null,
      reads: statement(0).reads.filter(({ channel }) => channel !== 'production'),
    };
    const draft = await home.owner.call(logApi.addStatement, { params: home.params, body: { statement: bare } });
    expect(draft.value.hints).toContain('No production file covers 14 Jun – 14 Jul 2025.');
    expect(draft.value.ready).toBe(true);
  });
});

describe('the same file twice', () => {
  it('changes nothing while it is in the log, and says so', async () => {
    const home = await ready();
    const file = statementFile([statement(0)]);
    await upload(home, 'june.csv', file);
    const before = changes();
    const again = await upload(home, 'june (1).csv', file);
    expect(again.status).toBe(409);
    expect(again.problem).toMatchObject({ code: 'file-already-here' });
    expect(again.problem.detail).toBe(
      'june (1).csv (the same file as june.csv) is in this log already. Nothing was changed.',
    );
    expect(changes()).toBe(before);
  });

  it('changes nothing once it is posted, and says when it came', async () => {
    const home = await ready();
    const file = statementFile([statement(0)]);
    await upload(home, 'june.csv', file);
    await post(home);
    const before = changes();
    const again = await upload(home, 'june.csv', file);
    expect(again.problem.detail).toBe(
      'june.csv was posted already; it was uploaded on 1 Dec 2026. Nothing was changed.',
    );
    expect(changes()).toBe(before);
  });

  it('a statement posted already, in other bytes, is left alone', async () => {
    const home = await ready();
    await upload(home, 'june.csv', statementFile([statement(0)]));
    await post(home);
    const again = (await upload(home, 'june-again.csv', `${statementFile([statement(0)])}\n`)).value;
    expect(again.statements[0]).toMatchObject({ alreadyPosted: true, replaces: null });
    expect(again.ready).toBe(false);
    const refused = await post(home);
    expect(refused.problem.code).toBe('cycle-already-posted');
    expect(await cyclesOf(home)).toHaveLength(1);
  });

  it('a file with one posted and one new statement posts the new one', async () => {
    const home = await ready();
    await upload(home, 'june.csv', statementFile([statement(0)]));
    await post(home);
    const both = (await upload(home, 'both.csv', statementFile([statement(0), statement(1)]))).value;
    expect(both.statements.map((found) => found.alreadyPosted)).toEqual([true, false]);
    expect((await post(home)).value.cycles.map(({ to }) => to)).toEqual([statement(1).to]);
    expect(await cyclesOf(home)).toHaveLength(2);
  });

  it('a production file may be read once for each channel it holds', async () => {
    const home = await ready();
    const file = intervalFile(channelDays('import', statement(0).from, statement(0).to));
    expect((await uploadReadings(home, 'meter.csv', file, 'import')).status).toBe(200);
    expect((await uploadReadings(home, 'meter.csv', file, 'import')).problem.code).toBe('file-already-here');
    expect((await uploadReadings(home, 'meter.csv', file, 'export')).value.readings).toHaveLength(2);
    expect((await post(home)).value.readingsDays).toEqual({ import: 30, export: 30 });
    expect((await uploadReadings(home, 'meter.csv', file, 'import')).problem.code).toBe('file-already-here');
  });
});

describe('cycles that meet other cycles', () => {
  it('a statement that crosses a posted cycle is not posted, and both are named', async () => {
    const home = await ready();
    await upload(home, 'june.csv', statementFile([statement(0)]));
    await post(home);
    const crossing = { ...bodyOfStatement(statement(1)), from: addDays(statement(1).from, -3) };
    const draft = (await home.owner.call(logApi.addStatement, { params: home.params, body: { statement: crossing } }))
      .value;
    expect(draft.ready).toBe(false);
    expect(draft.blockers[0]).toBe(
      '11 Jul – 14 Aug 2025 overlaps 14 Jun – 14 Jul 2025, which is posted. Put the dates right, or correct the posted cycle first.',
    );
    const refused = await post(home);
    expect(refused.status).toBe(409);
    expect(refused.problem.code).toBe('cycle-overlaps');
  });

  it('two statements of one log that cross block it until one goes', async () => {
    const home = await ready();
    await home.owner.call(logApi.addStatement, {
      params: home.params,
      body: { statement: bodyOfStatement(statement(0)) },
    });
    const twice = await home.owner.call(logApi.addStatement, {
      params: home.params,
      body: { statement: bodyOfStatement(statement(0)) },
    });
    expect(twice.value.blockers[0]).toMatch(/is in this log twice/);
    const key = twice.value.statements[1]?.key ?? '';
    const one = await home.owner.call(logApi.removeStatement, { params: { ...home.params, key } });
    expect(one.value).toMatchObject({ ready: true, blockers: [] });
  });

  it('the same dates with other values make a new revision, and the old one stays', async () => {
    const home = await ready();
    const { to } = statement(0);
    await upload(home, 'june.csv', statementFile([statement(0)]));
    await post(home);
    const other = { ...bodyOfStatement(statement(0)), amountDueCents: cents(statement(0).amountDueCents + 250) };
    const draft = (await home.owner.call(logApi.addStatement, { params: home.params, body: { statement: other } }))
      .value;
    expect(draft.statements[0]?.replaces).toEqual({ from: statement(0).from, to, revision: 1 });
    expect((await post(home)).value.cycles[0]?.billedDueCents).toBe(other.amountDueCents);
    const view = (await home.owner.call(cyclesApi.one, { params: { ...home.params, to } })).value;
    expect(view.cycle.statement.revision).toBe(2);
    expect(view.revisions.map(({ revision, amountDueCents }) => [revision, amountDueCents])).toEqual([
      [1, statement(0).amountDueCents],
    ]);
    expect(await cyclesOf(home)).toHaveLength(1);
  });

  it('a correction is a revision with a reason; moving it onto another cycle is refused', async () => {
    const home = await ready();
    await upload(home, 'two.csv', statementFile([statement(0), statement(1)]));
    await post(home);
    const params = { ...home.params, to: statement(1).to };
    const body = bodyOfStatement(statement(1));
    const onto = await home.owner.call(cyclesApi.correct, {
      params,
      body: { statement: { ...body, from: addDays(body.from, -5) }, reason: 'wrong dates' },
    });
    expect(onto.problem.code).toBe('cycle-overlaps');
    const same = await home.owner.call(cyclesApi.correct, { params, body: { statement: body, reason: 'none' } });
    expect(same.problem.code).toBe('conflict');
    const moved = await home.owner.call(cyclesApi.correct, {
      params,
      body: { statement: { ...body, to: addDays(body.to, 2) }, reason: 'the read was two days later' },
    });
    expect(moved.value.to).toBe(addDays(body.to, 2));
    const view = (await home.owner.call(cyclesApi.one, { params: { ...home.params, to: moved.value.to } })).value;
    expect(view.cycle.statement).toMatchObject({ revision: 2, reason: 'the read was two days later' });
    expect(await cyclesOf(home)).toHaveLength(2);
  });
});

describe('readings that meet other readings', () => {
  const [a, b] = [day('2025-06-14'), day('2025-06-20')];

  it('the same values merge without a question', async () => {
    const home = await ready();
    await uploadReadings(home, 'week.csv', intervalFile(channelDays('production', a, b)));
    await post(home);
    const more = (await uploadReadings(home, 'longer.csv', intervalFile(channelDays('production', a, addDays(b, 3)))))
      .value;
    expect(more.readings[0]?.overlap).toEqual({ sameDays: 6, differentDays: [] });
    expect((await post(home)).value.readingsDays).toEqual({ production: 3 });
  });

  it('a day that was cut short is completed without a question', async () => {
    const home = await ready();
    const days = channelDays('production', a, addDays(a, 2));
    const cut = days.map((found, index) => (index === 1 ? { ...found, values: found.values.slice(0, 13) } : found));
    await uploadReadings(home, 'cut.csv', intervalFile(cut));
    await post(home);
    const whole = (await uploadReadings(home, 'whole.csv', intervalFile(days))).value;
    expect(whole.readings[0]?.overlap).toEqual({ sameDays: 1, differentDays: [] });
    expect((await post(home)).value.readingsDays).toEqual({ production: 1 });
  });

  it('other values ask first, and replace what is here only when told to', async () => {
    const home = await ready();
    const days = channelDays('production', a, b);
    await uploadReadings(home, 'first.csv', intervalFile(days));
    await post(home);
    const other = days.map((found, index) =>
      index === 2
        ? { ...found, values: found.values.map((value, step) => (step === 12 ? (value ?? 0) + 5 : value)) }
        : found,
    );
    const draft = (await uploadReadings(home, 'second.csv', intervalFile(other))).value;
    expect(draft.readings[0]?.overlap).toEqual({ sameDays: 5, differentDays: ['2025-06-16'] });
    const asked = await post(home);
    expect(asked.status).toBe(409);
    expect(asked.problem).toMatchObject({ code: 'readings-conflict' });
    expect(asked.problem.detail).toContain('for 1 day, the first 16 Jun 2025');
    expect((await post(home, true)).value.readingsDays).toEqual({ production: 1 });
  });
});

describe('a file with bad rows', () => {
  const bad = () =>
    statementFile([statement(0), statement(1)]).replace(
      '2025-07-14,2025-08-14,line,import,Import,',
      '2025-07-14,2025-08-14,line,import,Import,twelve',
    );

  it('waits; its good rows are kept only when the owner says so, and the bad ones with their reason', async () => {
    const home = await ready();
    const waiting = (await upload(home, 'summer.csv', bad())).value;
    expect(waiting.ready).toBe(false);
    expect(waiting.statements).toEqual([]);
    const [file] = waiting.files;
    expect(file?.faults[0]).toMatchObject({ fileName: 'summer.csv', column: 'amount' });
    expect(file?.faults[0]?.row).toBeGreaterThan(1);
    expect(waiting.blockers[0]).toMatch(/^summer\.csv: 1 row cannot be read/);
    expect((await post(home)).status).toBe(409);
    expect(await cyclesOf(home)).toEqual([]);

    const params = { ...home.params, documentId: file?.documentId ?? '' };
    const kept = await home.owner.call(logApi.keepGoodRows, { params, body: { keep: true } });
    expect(kept.value.ready).toBe(true);
    expect(kept.value.statements).toHaveLength(2);
    await post(home);
    const rejected = server.deps.sqlite
      .prepare('SELECT row, column_name, reason FROM rejected_rows WHERE household_id = ?')
      .all(home.id);
    expect(rejected).toHaveLength(1);
    expect(rejected[0]).toMatchObject({
      row: file?.faults[0]?.row,
      column_name: 'amount',
      reason: file?.faults[0]?.message,
    });
  });

  it('a production file with a row that cannot be read waits likewise', async () => {
    const home = await ready();
    const lines = intervalFile(channelDays('production', '2025-06-14', '2025-06-20')).split('\n');
    lines[30] = `${lines[30]?.split(',')[0]},broken`;
    const waiting = (await uploadReadings(home, 'week.csv', lines.join('\n'))).value;
    expect(waiting.readings[0]?.rejectedRows).toBe(1);
    expect(waiting.ready).toBe(false);
    const params = { ...home.params, documentId: waiting.readings[0]?.documentId ?? '' };
    const kept = await home.owner.call(logApi.keepGoodRows, { params, body: { keep: true } });
    expect(kept.value).toMatchObject({ ready: true, blockers: [] });
    expect(kept.value.readings[0]?.keepGoodRows).toBe(true);
    await post(home);
    expect(server.deps.sqlite.prepare('SELECT row FROM rejected_rows WHERE household_id = ?').all(home.id)).toEqual([
      { row: 31 },
    ]);
  });
});

describe('posting is all or nothing', () => {
  it('whatever write fails, nothing of it stays and the log is still there', async () => {
    const home = await ready();
    await upload(home, 'two.csv', statementFile([statement(0), statement(1)]));
    await uploadReadings(
      home,
      'production.csv',
      intervalFile(channelDays('production', statement(0).from, statement(1).to)),
    );
    const { sqlite } = server.deps;
    const tables = sqlite
      .prepare("SELECT name FROM sqlite_schema WHERE type = 'table' AND name NOT LIKE 'sqlite_%'")
      .pluck()
      .all();
    const state = () => JSON.stringify(tables.map((table) => sqlite.prepare(`SELECT * FROM "${table}"`).all()));
    const before = state();
    const writes = [
      'statements',
      'statement_lines',
      'statement_banks',
      'statement_reads',
      'interval_days',
      'audit_events',
    ];
    for (const table of writes) {
      sqlite.exec(
        `CREATE TEMP TRIGGER fail_here BEFORE INSERT ON "${table}" BEGIN SELECT RAISE(ABORT, 'injected'); END`,
      );
      const failed = await post(home);
      sqlite.exec('DROP TRIGGER fail_here');
      expect(failed.status).toBe(500);
      expect(failed.problem).toEqual({
        code: 'server-error',
        detail: 'Something went wrong on our side. Nothing was changed; try again.',
        faults: [],
      });
      expect(failed.text).not.toMatch(/injected|\.ts|at /);
      expect(state()).toBe(before);
      server.logs.splice(0, server.logs.length, ...server.logs.filter((line) => line.event !== 'failed'));
    }
    expect((await post(home)).status).toBe(200);
    expect(await cyclesOf(home)).toHaveLength(2);
  });
});
