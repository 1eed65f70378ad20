type Value = string | number | boolean | null;
type Level = 'info' | 'warn' | 'error';

/** Writes one line per event. Never given passwords, tokens, file contents or addresses of people. */
export type Log = (level: Level, event: string, about?: Record<string, Value>) => void;

function textOf(value: Value): string {
  const text = String(value);
  return /^[\w.:/+@-]+$/.test(text) ? text : JSON.stringify(text);
}

/** A log of plain lines, `time level event name=value …`. */
export function lineLog(write: (line: string) => void, now: () => Date = () => new Date()): Log {
  return (level, event, about = {}) => {
    const pairs = Object.entries(about).map(([name, value]) => `${name}=${textOf(value)}`);
    write(`${[now().toISOString(), level, event, ...pairs].join(' ')}\n`);
  };
}

export const silentLog: Log = () => {};
