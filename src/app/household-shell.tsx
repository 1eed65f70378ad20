import { useQuery } from '@tanstack/react-query';
import { useEffect, useRef } from 'react';
import { Link, Navigate, NavLink, Outlet, ScrollRestoration, useLocation, useParams } from 'react-router-dom';
import type { SessionView } from '#shared/api/session.ts';
import type { HouseholdContext } from '#src/lib/household.ts';
import { sessionQuery } from '#src/lib/session.ts';
import { Brand } from '#src/ui/brand.tsx';
import { ErrorState, PageSkeleton } from '#src/ui/states.tsx';
import { WorkingProvider } from '#src/ui/working.tsx';
import { PersonMenu } from './person-menu.tsx';

type Place = { to: string; label: string };

/** The screens a role may open. A preparer has the Tax credit screen and nothing else. */
function placesFor(role: HouseholdContext['role']): Place[] {
  const credit = { to: 'credit', label: 'Tax credit' };
  if (role === 'preparer') return [credit];
  const shared = [
    { to: '.', label: 'Position' },
    { to: 'cycles', label: 'Cycles' },
    { to: 'money', label: 'Money' },
    credit,
    { to: 'plan', label: 'Rate plan' },
    { to: 'setup', label: 'Set-up' },
  ];
  return role === 'owner' ? [...shared, { to: 'people', label: 'People' }] : shared;
}

/** Head, navigation and the household's context; sends the signed-out to sign-in and a preparer to the Tax credit screen. */
export function HouseholdShell() {
  const session = useQuery(sessionQuery);
  const { householdId } = useParams();
  const location = useLocation();
  if (session.isPending) return <PageSkeleton />;
  if (session.isError) return <ErrorState error={session.error} retry={() => session.refetch()} />;
  if (session.data === null) return <Navigate to="/sign-in" replace state={{ from: location.pathname }} />;
  const household = session.data.households.find((one) => one.id === householdId);
  if (!household) return <Navigate to="/" replace />;
  const base = `/h/${household.id}`;
  const here = location.pathname.slice(base.length).replace(/^\//, '');
  if (household.role === 'preparer' && here !== 'credit' && here !== 'account') {
    return <Navigate to={`${base}/credit`} replace />;
  }
  if (household.role === 'member' && here === 'log') return <Navigate to={base} replace />;
  const context: HouseholdContext = {
    id: household.id,
    name: household.name,
    role: household.role,
    personName: session.data.user.name,
    canEdit: household.role === 'owner',
  };
  return <Shell session={session.data} context={context} base={base} />;
}

function Shell({ session, context, base }: { session: SessionView; context: HouseholdContext; base: string }) {
  const places = placesFor(context.role);
  const owner = context.role === 'owner';
  // Try a change belongs to Money: the head shows so.
  const { pathname } = useLocation();
  const isHere = (place: Place, isActive: boolean) =>
    isActive || (place.to === 'money' && pathname.startsWith(`${base}/try`));
  return (
    <WorkingProvider>
      <a href="#content" className="visually-hidden focus:not-sr-only">
        Skip to the content
      </a>
      <header className="no-print flex items-center gap-9 border-b border-rule px-[18px] py-3.5 lg:px-10">
        <Link to={base} className="no-underline">
          <Brand />
        </Link>
        <nav aria-label="Screens" className="hidden gap-[26px] md:flex">
          {places.map((place) => (
            <NavLink
              key={place.to}
              to={place.to === '.' ? base : `${base}/${place.to}`}
              end={place.to === '.'}
              className={({ isActive }) =>
                `border-b-[3px] py-1.5 no-underline ${isHere(place, isActive) ? 'border-accent font-semibold text-ink' : 'border-transparent text-soft hover:text-ink'}`
              }
            >
              {place.label}
            </NavLink>
          ))}
        </nav>
        <div className="flex-1" />
        <PersonMenu session={session} context={context} base={base} />
        {owner && (
          <Link to={`${base}/log`} className="btn hidden md:inline-flex">
            Log this month
          </Link>
        )}
      </header>
      <main id="content">
        <Outlet context={context} />
      </main>
      {context.role !== 'preparer' && <BottomBar base={base} owner={owner} places={places} />}
      <ScrollRestoration />
    </WorkingProvider>
  );
}

/** The phone's bar: Position, Log month, Cycles, More. */
function BottomBar({ base, owner, places }: { base: string; owner: boolean; places: Place[] }) {
  const more = useRef<HTMLDetailsElement>(null);
  const location = useLocation();
  // The menu belongs to the page it was opened on.
  // biome-ignore lint/correctness/useExhaustiveDependencies: closes whenever the place changes
  useEffect(() => {
    more.current?.removeAttribute('open');
  }, [location.pathname]);
  const item = ({ isActive }: { isActive: boolean }) =>
    `flex min-h-11 flex-1 items-center justify-center border-t-[3px] px-2 no-underline ${isActive ? 'border-accent font-semibold text-ink' : 'border-transparent text-soft'}`;
  const rest = places.filter((place) => place.to !== '.' && place.to !== 'cycles');
  return (
    <nav
      aria-label="Main"
      className="no-print fixed inset-x-0 bottom-0 z-10 flex items-stretch gap-1 border-t border-rule bg-sheet px-1 pb-[env(safe-area-inset-bottom)] md:hidden"
    >
      <NavLink to={base} end className={item}>
        Position
      </NavLink>
      {owner && (
        <NavLink to={`${base}/log`} className="btn my-2 flex-1 px-3">
          Log month
        </NavLink>
      )}
      <NavLink to={`${base}/cycles`} className={item}>
        Cycles
      </NavLink>
      <details ref={more} className="relative flex flex-1 items-stretch">
        <summary className="flex min-h-11 w-full list-none items-center justify-center border-t-[3px] border-transparent text-soft">
          More
        </summary>
        <ul className="absolute right-0 bottom-full mb-2 min-w-44 rounded-md border border-rule bg-sheet py-2 shadow-lg">
          {[...rest, { to: 'try', label: 'Try a change' }, { to: 'account', label: 'Account' }].map((place) => (
            <li key={place.to}>
              <Link to={`${base}/${place.to}`} className="flex min-h-11 items-center px-5 no-underline">
                {place.label}
              </Link>
            </li>
          ))}
        </ul>
      </details>
    </nav>
  );
}
