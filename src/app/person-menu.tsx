import { useEffect, useRef } from 'react';
import { Link, useLocation, useNavigate } from 'react-router-dom';
import type { SessionView } from '#shared/api/session.ts';
import type { HouseholdContext } from '#src/lib/household.ts';
import { useSignOut } from '#src/lib/session.ts';

/** "12 Tern Lane · Priya", opening the account, the other households and sign-out. */
export function PersonMenu({
  session,
  context,
  base,
}: {
  session: SessionView;
  context: HouseholdContext;
  base: string;
}) {
  const menu = useRef<HTMLDetailsElement>(null);
  const location = useLocation();
  const navigate = useNavigate();
  const signOut = useSignOut();
  // biome-ignore lint/correctness/useExhaustiveDependencies: closes whenever the place changes
  useEffect(() => {
    menu.current?.removeAttribute('open');
  }, [location.pathname]);
  const others = session.households.filter((household) => household.id !== context.id);
  const firstName = context.personName.split(' ')[0] ?? context.personName;
  return (
    <details ref={menu} className="relative min-w-0">
      <summary className="flex min-h-11 min-w-0 list-none items-center text-[15px] text-soft hover:text-ink">
        <span className="max-w-[38vw] truncate md:max-w-[180px]">{context.name}</span>
        <span className="hidden whitespace-nowrap xl:inline">&nbsp;·&nbsp;{firstName}</span>
      </summary>
      <ul className="absolute right-0 top-full z-20 min-w-56 rounded-md border border-rule bg-sheet py-2 shadow-lg">
        <li className="hint px-5 py-1">{session.user.email}</li>
        {others.map((household) => (
          <li key={household.id}>
            <Link to={`/h/${household.id}`} className="flex min-h-11 items-center px-5 no-underline">
              {household.name}
            </Link>
          </li>
        ))}
        <li>
          <Link to={`${base}/account`} className="flex min-h-11 items-center px-5 no-underline">
            Account
          </Link>
        </li>
        <li>
          <button
            type="button"
            className="flex min-h-11 w-full items-center border-0 bg-transparent px-5 text-left"
            onClick={() => signOut.mutate(undefined, { onSuccess: () => navigate('/sign-in') })}
          >
            Sign out
          </button>
        </li>
      </ul>
    </details>
  );
}
