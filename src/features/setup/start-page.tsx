import { zodResolver } from '@hookform/resolvers/zod';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { Link, Navigate, useNavigate } from 'react-router-dom';
import * as z from 'zod/mini';
import { showRefusal } from '#src/lib/form-faults.ts';
import { sessionQuery, useSignOut } from '#src/lib/session.ts';
import { Button } from '#src/ui/button.tsx';
import { ErrorSummary, Field } from '#src/ui/field.tsx';
import { PlainPage } from '#src/ui/plain-page.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { ErrorState, PageSkeleton } from '#src/ui/states.tsx';
import { useCreateHousehold } from './setup-queries.ts';
import { guessedTimeZone, TimeZoneField } from './time-zone-field.tsx';

const startForm = z.object({
  name: z.string().check(z.trim(), z.minLength(1, { error: 'Write a name, such as the address.' }), z.maxLength(120)),
  timeZone: z.string(),
});

export function StartPage() {
  const session = useQuery(sessionQuery);
  const create = useCreateHousehold();
  const signOut = useSignOut();
  const navigate = useNavigate();
  const [refusals, setRefusals] = useState<string[]>([]);
  const { register, handleSubmit, formState, setError, watch } = useForm({
    resolver: zodResolver(startForm),
    mode: 'onTouched',
    defaultValues: { name: '', timeZone: guessedTimeZone() },
  });
  if (session.isPending) return <PageSkeleton />;
  if (session.isError) return <ErrorState error={session.error} retry={() => session.refetch()} />;
  if (session.data === null) return <Navigate to="/sign-in" replace state={{ from: '/start' }} />;
  const others = session.data.households;
  const submit = handleSubmit((body) => {
    setRefusals([]);
    create.mutate(body, {
      onSuccess: ({ id }) => navigate(`/h/${id}/setup`, { replace: true }),
      onError: (error) => setRefusals(showRefusal(error, setError, (name) => name === 'name' || name === 'timeZone')),
    });
  });
  return (
    <PlainPage
      aside={
        <button type="button" className="link min-h-11" onClick={() => signOut.mutate()}>
          Sign out
        </button>
      }
    >
      <Sentence title="Start" lede="A name for the book and the clock of the house. Everything else can wait.">
        <b>Which house</b> is this book for?
      </Sentence>
      <form onSubmit={submit} noValidate className="mt-6">
        <ErrorSummary title="The book was not started" errors={refusals.map((text) => ({ text }))} />
        <Field
          label="Name of the household"
          hint="The address does well: 12 Tern Lane."
          autoComplete="off"
          error={formState.errors.name?.message}
          {...register('name')}
        />
        <TimeZoneField
          current={watch('timeZone')}
          error={formState.errors.timeZone?.message}
          {...register('timeZone')}
        />
        <p className="mt-6">
          <Button type="submit" busy={create.isPending}>
            Start the book
          </Button>
        </p>
      </form>
      {others.length > 0 && (
        <p className="hint mt-8">
          You can open already:{' '}
          {others.map((one, index) => (
            <span key={one.id}>
              {index > 0 && ', '}
              <Link className="link" to={`/h/${one.id}`}>
                {one.name}
              </Link>
            </span>
          ))}
          .
        </p>
      )}
    </PlainPage>
  );
}
