import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Navigate } from 'react-router-dom';
import type { Role } from '#shared/api/endpoint.ts';
import type { PersonView } from '#shared/api/people.ts';
import { parseDay } from '#shared/units/day.ts';
import { fullDate } from '#src/lib/format.ts';
import { useHousehold } from '#src/lib/household.ts';
import { errorWords } from '#src/lib/problem-words.ts';
import { Button } from '#src/ui/button.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { ErrorState, PageSkeleton } from '#src/ui/states.tsx';
import { AddPerson } from './add-person.tsx';
import { peopleQuery, useRemovePerson } from './people-queries.ts';
import { ROLES } from './roles.ts';

export function PeoplePage() {
  const { id, canEdit } = useHousehold();
  const people = useQuery({ ...peopleQuery(id), enabled: canEdit });
  if (!canEdit) return <Navigate to={`/h/${id}`} replace />;
  if (people.isPending) return <PageSkeleton />;
  if (people.isError) return <ErrorState error={people.error} retry={() => people.refetch()} />;
  const list = people.data;
  const owners = list.filter((person) => person.role === 'owner').length;
  return (
    <div className="page max-w-[860px]">
      <Sentence title="People" lede="What each may see is kept to on the server, not only on the screen.">
        <b>{list.length === 1 ? 'You alone' : `${COUNTS[list.length] ?? list.length} people`}</b> can open this book.
      </Sentence>
      <Sheet title="Who may see what">
        <table className="ruled ruled-stack">
          <thead>
            <tr>
              <th scope="col">Name</th>
              <th scope="col" className="text">
                Role
              </th>
              <th scope="col" className="text">
                Since
              </th>
              <th scope="col">
                <span className="visually-hidden">Remove</span>
              </th>
            </tr>
          </thead>
          <tbody>
            {list.map((person) => (
              <PersonRow key={person.userId} person={person} lastOwner={person.role === 'owner' && owners === 1} />
            ))}
          </tbody>
        </table>
      </Sheet>
      <Sheet title="The roles">
        <dl>
          {(Object.keys(ROLES) as Role[]).map((role) => (
            <div key={role} className="border-t border-rule py-2.5 first:border-0">
              <dt className="font-semibold">{ROLES[role].name}</dt>
              <dd className="hint">{ROLES[role].may}</dd>
            </div>
          ))}
        </dl>
      </Sheet>
      <AddPerson />
    </div>
  );
}

const COUNTS = ['No', 'One', 'Two', 'Three', 'Four', 'Five', 'Six', 'Seven', 'Eight', 'Nine'];

function PersonRow({ person, lastOwner }: { person: PersonView; lastOwner: boolean }) {
  const { id } = useHousehold();
  const remove = useRemovePerson(id);
  const [asking, setAsking] = useState(false);
  const since = parseDay(person.since.slice(0, 10));
  return (
    <tr>
      <th scope="row">
        {person.name}
        {person.you && <span className="hint"> (you)</span>}
        <span className="hint block break-all">{person.email}</span>
      </th>
      <td className="text" data-label="Role">
        {ROLES[person.role].name}
      </td>
      <td className="text whitespace-nowrap" data-label="Since">
        {since ? fullDate(since) : ''}
      </td>
      <td>
        {lastOwner ? (
          <span className="hint">the last owner stays</span>
        ) : asking ? (
          <span className="flex flex-wrap items-center justify-end gap-x-4">
            <Button look="plain" busy={remove.isPending} onClick={() => remove.mutate(person.userId)}>
              Yes, take access away
            </Button>
            <button type="button" className="link min-h-11" onClick={() => setAsking(false)}>
              No
            </button>
          </span>
        ) : (
          <button type="button" className="link min-h-11" onClick={() => setAsking(true)}>
            Remove<span className="visually-hidden"> {person.name}</span>
          </button>
        )}
        {remove.isError && (
          <span role="alert" className="field-error">
            {errorWords(remove.error)}
          </span>
        )}
      </td>
    </tr>
  );
}
