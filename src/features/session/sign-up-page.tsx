import { zodResolver } from '@hookform/resolvers/zod';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { Link, Navigate, useNavigate } from 'react-router-dom';
import { PASSWORD_MIN, signUpBody } from '#shared/api/session.ts';
import { ACCOUNT_FIELDS, showRefusal } from '#src/lib/form-faults.ts';
import { sessionQuery } from '#src/lib/session.ts';
import { Button } from '#src/ui/button.tsx';
import { ErrorSummary, Field } from '#src/ui/field.tsx';
import { PasswordField } from '#src/ui/password-field.tsx';
import { PlainPage } from '#src/ui/plain-page.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { useSignUp } from './session-queries.ts';

export function SignUpPage() {
  const session = useQuery(sessionQuery);
  const signUp = useSignUp();
  const navigate = useNavigate();
  const [refusals, setRefusals] = useState<string[]>([]);
  const { register, handleSubmit, formState, setError } = useForm({
    resolver: zodResolver(signUpBody),
    mode: 'onTouched',
    defaultValues: { name: '', email: '', password: '' },
  });
  if (session.data && !signUp.isPending && !signUp.isSuccess) return <Navigate to="/" replace />;
  const submit = handleSubmit((typed) => {
    setRefusals([]);
    signUp.mutate(typed, {
      onSuccess: () => navigate('/start', { replace: true }),
      onError: (error) => setRefusals(showRefusal(error, setError, (name) => name in formFields, ACCOUNT_FIELDS)),
    });
  });
  return (
    <PlainPage aside={<Link to="/sign-in">Sign in</Link>}>
      <Sentence title="Start a book" lede="Is the roof paying for itself? The book answers from your own papers.">
        <b>Start a book</b> for your house.
      </Sentence>
      <form onSubmit={submit} noValidate className="mt-6">
        <ErrorSummary title="The account was not made" errors={refusals.map((text) => ({ text }))} />
        <Field
          label="Your name"
          hint="As the others in the house know you."
          autoComplete="name"
          error={formState.errors.name?.message}
          {...register('name')}
        />
        <Field
          label="E-mail"
          type="email"
          inputMode="email"
          autoComplete="username"
          error={formState.errors.email?.message}
          {...register('email')}
        />
        <PasswordField
          autoComplete="new-password"
          hint={`${PASSWORD_MIN} characters or more. A short sentence is easy to keep; spaces, any letters and pasting are fine. Common passwords are refused.`}
          error={formState.errors.password?.message}
          {...register('password')}
        />
        <p className="mt-4">
          <Button type="submit" busy={signUp.isPending}>
            {signUp.isPending ? 'One moment' : 'Make my account'}
          </Button>
        </p>
      </form>
    </PlainPage>
  );
}

const formFields = { name: true, email: true, password: true };
