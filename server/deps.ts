import type { Clock } from './clock.ts';
import type { Database } from './db/client.ts';
import type { Log } from './log.ts';

/** What of the environment the application itself needs to know. */
export type Settings = {
  /** Exact origins from which a browser may send unsafe requests without `Sec-Fetch-Site`. */
  origins: readonly string[];
  /** True where the public address is https: cookies are then Secure and carry the `__Host-` prefix. */
  https: boolean;
  signUp: 'open' | 'closed';
  /** Proxies in front whose X-Forwarded-For is believed; 0 believes none. */
  trustedProxies: number;
  /** Folder of the built client; null serves the API alone. */
  distDir: string | null;
  /** Parses every response before it is sent; on in tests. */
  checkResponses: boolean;
};

/** Everything the application works with. */
export type Deps = Database & { clock: Clock; log: Log; settings: Settings };

/** Who is doing something, in which household. */
export type Actor = { userId: string; name: string; householdId: string; role: 'owner' | 'member' | 'preparer' };
