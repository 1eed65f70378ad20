import { useQuery } from '@tanstack/react-query';
import { useNavigate } from 'react-router-dom';
import { peopleApi } from '#shared/api/people.ts';
import { addressOf } from '#src/lib/api.ts';
import { useHousehold } from '#src/lib/household.ts';
import { sessionQuery, useSignOut } from '#src/lib/session.ts';
import { Button } from '#src/ui/button.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { ChangePassword } from './change-password.tsx';

const ROLE_WORDS = { owner: 'an owner', member: 'a household member', preparer: 'the tax preparer' } as const;

export function AccountPage() {
  const { id, name, role, personName } = useHousehold();
  const session = useQuery(sessionQuery);
  const signOut = useSignOut();
  const navigate = useNavigate();
  const email = session.data?.user.email ?? '';
  return (
    <div className="page page-narrow">
      <Sentence
        title="Account"
        lede={
          <>
            Signed in as <b className="break-all">{email}</b>.
          </>
        }
      >
        <b>{personName}</b>, {ROLE_WORDS[role]} of {name}.
      </Sentence>
      <p className="mt-5">
        <Button
          look="plain"
          busy={signOut.isPending}
          onClick={() => signOut.mutate(undefined, { onSuccess: () => navigate('/sign-in') })}
        >
          Sign out
        </Button>
      </p>
      <ChangePassword email={email} />
      {role === 'owner' && (
        <Sheet
          title="The full export"
          hint="One JSON file with everything this household has stated and uploaded: the house, plans, loan, mortgage, credit and incentive; every statement with all its revisions; every reading; and the files themselves, as they came. The figures are worked out from it again, cent for cent."
        >
          <p className="mt-3">
            <a className="btn btn-plain" href={addressOf(peopleApi.exportHousehold, { householdId: id })} download>
              Download the export
            </a>
          </p>
          <p className="hint mt-3">It holds no passwords. Keep it where you keep your papers.</p>
        </Sheet>
      )}
    </div>
  );
}
