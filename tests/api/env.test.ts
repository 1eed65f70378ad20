import { describe, expect, it } from 'vitest';
import { acceptPassword } from '#server/auth/passwords.ts';
import { dayIn, isTimeZone } from '#server/clock.ts';
import { parseEnv } from '#server/env.ts';
import { lineLog } from '#server/log.ts';

const parse = (given: Record<string, string>) => parseEnv(given, '/srv/gablebook');
const refusal = (given: Record<string, string>) => {
  const parsed = parse(given);
  return parsed.ok ? null : parsed.problem.detail;
};

describe('the configuration', () => {
  it('needs nothing', () => {
    const parsed = parse({});
    expect(parsed.ok && parsed.value).toEqual({
      port: 4470,
      host: '127.0.0.1',
      dataDir: '/srv/gablebook/data',
      sample: 'auto',
      origins: ['http://127.0.0.1:4470', 'http://localhost:4470'],
      signUp: 'open',
      log: 'all',
      trustedProxies: 0,
    });
    expect(parse({ PORT: '', HOST: ' ' })).toEqual(parsed);
  });

  it('closes the door to sign-ups where others can reach it, unless it is opened', () => {
    const signUp = (given: Record<string, string>) => {
      const parsed = parse(given);
      return parsed.ok ? parsed.value.signUp : null;
    };
    expect(signUp({ HOST: '0.0.0.0' })).toBe('closed');
    expect(signUp({ HOST: '0.0.0.0', SIGN_UP: 'open' })).toBe('open');
    expect(signUp({ HOST: 'localhost' })).toBe('open');
  });

  it('takes several public addresses, without their last slash', () => {
    const parsed = parse({ ORIGIN: 'https://book.example.org/, http://127.0.0.1:8080' });
    expect(parsed.ok && parsed.value.origins).toEqual(['https://book.example.org', 'http://127.0.0.1:8080']);
  });

  it.each([
    [{ PORT: 'http' }, 'PORT is "http"; it must be a port number from 0 to 65535.'],
    [{ PORT: '70000' }, 'PORT is "70000"; it must be a port number from 0 to 65535.'],
    [{ SAMPLE: 'yes' }, 'SAMPLE is "yes"; it must be auto, always or never.'],
    [{ SIGN_UP: 'no' }, 'SIGN_UP is "no"; it must be open or closed.'],
    [{ ORIGIN: 'book.example.org' }, /^ORIGIN is "book.example.org"; it must be the public address/],
    [{ ORIGIN: 'https://book.example.org/app' }, /^ORIGIN/],
    [{ TRUST_PROXY: 'true' }, /^TRUST_PROXY/],
    [{ HOST: 'a b' }, /^HOST/],
  ])('%j is refused by name', (given, sentence) => {
    expect(refusal(given as Record<string, string>)).toMatch(sentence);
  });
});

describe('a password to be chosen (NIST SP 800-63B-4: length, a list of common ones, no rule of composition)', () => {
  const about = ['Priya Anand', 'priya.anand@example.org', 'gablebook'];
  const verdict = (password: string) => {
    const accepted = acceptPassword(password, about);
    return accepted.ok ? 'accepted' : accepted.problem.code;
  };

  it.each([
    ['fourteen chars', 'password-too-short'],
    ['fifteen charact', 'accepted'],
    ['all lower case words here', 'accepted'],
    ['🌞🌞🌧🌧🌞🌻🌞🌧🌙🌟🌞🌧🌙🌟🌻', 'accepted'],
    ['correct horse battery staple', 'password-too-common'],
    ['Password-123456789', 'password-too-common'],
    ['sunsunsunsunsunsun', 'password-too-common'],
    ['aaaaaaaaaaaaaaaaaa', 'password-too-common'],
    ['abcdefghijklmnopq', 'password-too-common'],
    ['1234567890123456', 'password-too-common'],
    ['priya anand 1987 gablebook', 'password-too-common'],
    ['x'.repeat(257), 'invalid-fields'],
  ])('%j: %s', (password, expected) => {
    expect(verdict(password)).toBe(expected);
  });

  it('each refusal says why', () => {
    for (const password of [
      'short',
      'correct horse battery staple',
      'sunsunsunsunsunsun',
      'priya anand 1987 gablebook',
    ]) {
      const refused = acceptPassword(password, about);
      expect(refused.ok ? '' : refused.problem.detail).toMatch(/\.$/);
    }
  });

  it('the same letters in another composition are the same password', () => {
    const [one, two] = ['caf\u00e9 over the water', 'cafe\u0301 over the water'].map((text) =>
      acceptPassword(text, about),
    );
    expect(one).toEqual(two);
    expect(one?.ok).toBe(true);
  });
});

describe('the clock and the log', () => {
  it('a day is the day of the house', () => {
    const instant = new Date('2026-03-01T04:30:00Z');
    expect(dayIn('America/New_York', instant)).toBe('2026-02-28');
    expect(dayIn('UTC', instant)).toBe('2026-03-01');
    expect(isTimeZone('America/New_York')).toBe(true);
    expect(isTimeZone('Nowhere')).toBe(false);
    expect(isTimeZone('')).toBe(false);
  });

  it('a line of the log is one line', () => {
    const lines: string[] = [];
    const log = lineLog(
      (line) => lines.push(line),
      () => new Date('2026-12-01T00:00:00Z'),
    );
    log('warn', 'odd', { path: '/a\nb', count: 2, nothing: null });
    expect(lines).toEqual(['2026-12-01T00:00:00.000Z warn odd path="/a\\nb" count=2 nothing=null\n']);
  });
});
