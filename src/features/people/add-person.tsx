import { zodResolver } from '@hookform/resolvers/zod';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { addPersonBody } from '#shared/api/people.ts';
import { PASSWORD_MIN, roleSchema } from '#shared/api/session.ts';
import { ACCOUNT_FIELDS, showRefusal } from '#src/lib/form-faults.ts';
import { useHousehold } from '#src/lib/household.ts';
import { Button } from '#src/ui/button.tsx';
import { Choices, ErrorSummary, Field } from '#src/ui/field.tsx';
import { PasswordField } from '#src/ui/password-field.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { useAddPerson } from './people-queries.ts';
import { ROLES } from './roles.ts';

const EMPTY = { name: '', email: '', role: 'member' as const, password: '' };

/** Adds a person directly, with a first password that the owner tells them in person. */
export function AddPerson() {
  const { id } = useHousehold();
  const add = useAddPerson(id);
  const [refusals, setRefusals] = useState<string[]>([]);
  const [added, setAdded] = useState<string | null>(null);
  const { register, handleSubmit, formState, setError, reset, watch, setValue } = useForm({
    resolver: zodResolver(addPersonBody),
    mode: 'onTouched',
    defaultValues: EMPTY as { name: string; email: string; role: 'owner' | 'member' | 'preparer'; password: string },
  });
  const submit = handleSubmit((body) => {
    setRefusals([]);
    setAdded(null);
    add.mutate(body, {
      onSuccess: (person) => {
        setAdded(person.name);
        reset(EMPTY);
      },
      onError: (error) => setRefusals(showRefusal(error, setError, (name) => name in EMPTY, ACCOUNT_FIELDS)),
    });
  });
  return (
    <Sheet
      title="Add a person"
      hint="They sign in with this e-mail and a first password, which you tell them in person. They can change it on their Account page."
    >
      {added && (
        <p role="status" className="mark-ok whitespace-normal!">
          {added} can sign in now.
        </p>
      )}
      <form onSubmit={submit} noValidate className="max-w-[520px]">
        <ErrorSummary title="Nobody was added" errors={refusals.map((text) => ({ text }))} />
        <Field label="Name" autoComplete="off" error={formState.errors.name?.message} {...register('name')} />
        <Field
          label="E-mail"
          type="email"
          inputMode="email"
          autoComplete="off"
          error={formState.errors.email?.message}
          {...register('email')}
        />
        <Choices
          legend="Role"
          name="role"
          value={watch('role')}
          onChange={(value) => setValue('role', roleSchema.parse(value))}
          options={roleSchema.options.map((role) => ({ value: role, label: ROLES[role].name, hint: ROLES[role].may }))}
        />
        <PasswordField
          label="First password"
          hint={`${PASSWORD_MIN} characters or more; a short sentence is easy to tell and to keep.`}
          autoComplete="new-password"
          error={formState.errors.password?.message}
          {...register('password')}
        />
        <p className="mt-4">
          <Button type="submit" busy={add.isPending}>
            Add this person
          </Button>
        </p>
      </form>
    </Sheet>
  );
}
