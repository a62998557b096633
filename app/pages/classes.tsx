import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useNavigate } from 'react-router-dom';
import type { ClassListItem } from '../../shared/schemas/class.ts';
import { newClassSchema } from '../../shared/schemas/class.ts';
import { classesQuery, createClass } from '../features/classes/classes.queries.ts';
import { ownTimeZone, timeZoneOptions } from '../features/classes/time-zones.ts';
import { FormError } from '../features/people/form-error.tsx';
import { useFormSubmit } from '../features/people/use-form-submit.ts';
import { viewerQuery } from '../features/people/viewer.queries.ts';
import { paths } from '../lib/paths.ts';
import { Button } from '../ui/button.tsx';
import { Checkbox } from '../ui/choice.tsx';
import { Head, Page } from '../ui/page.tsx';
import { EmptyState, ErrorState, Waiting } from '../ui/states.tsx';
import { Select, TextField } from '../ui/text-field.tsx';

export function Component() {
  const classes = useQuery(classesQuery);
  const [making, setMaking] = useState(false);
  const running = classes.data?.filter((each) => !each.archived) ?? [];
  const archived = classes.data?.filter((each) => each.archived) ?? [];
  return (
    <Page>
      <Head h1="Your classes" lead="Who writes, who reviews, and how people come in." />
      <div>
        {classes.isPending ? <Waiting /> : null}
        {classes.isError ? <ErrorState error={classes.error} onRetry={() => void classes.refetch()} /> : null}
        {classes.data && running.length === 0 && !making ? (
          <EmptyState title="No class yet">Make one, hand out its code, and people ask to join.</EmptyState>
        ) : null}
        {running.length > 0 ? <h2 className="sr-only">Classes that run</h2> : null}
        <ClassList items={running} />
        {making ? (
          <NewClass onCancel={() => setMaking(false)} />
        ) : (
          <div className="acts mt-8">
            <Button kind="primary" onClick={() => setMaking(true)}>
              New class
            </Button>
          </div>
        )}
        {archived.length > 0 ? (
          <section className="mt-12">
            <h2>Put away</h2>
            <ClassList items={archived} />
          </section>
        ) : null}
      </div>
    </Page>
  );
}

function ClassList({ items }: { readonly items: readonly ClassListItem[] }) {
  return (
    <ul className="mt-2">
      {items.map((item) => (
        <li key={item.id} className="border-b border-rule py-4">
          <h3>{item.role === 'teacher' ? <Link to={paths.class(item.id)}>{item.name}</Link> : item.name}</h3>
          <p className="small muted">
            {item.role !== 'teacher' ? item.role : null}
            {item.students === null
              ? null
              : `${item.role === 'teacher' ? '' : ' · '}${item.students} ${item.students === 1 ? 'student' : 'students'}`}
            {' · '}
            {item.timeZone.replaceAll('_', ' ')}
          </p>
          {item.waiting ? (
            <p className="small">
              <b>
                {item.waiting} {item.waiting === 1 ? 'person asks' : 'people ask'} to join.
              </b>
            </p>
          ) : null}
        </li>
      ))}
    </ul>
  );
}

function NewClass({ onCancel }: { readonly onCancel: () => void }) {
  const navigate = useNavigate();
  const queryClient = useQueryClient();
  const { form, onSubmit, isBusy, rootError, errorOf } = useFormSubmit({
    schema: newClassSchema,
    defaultValues: { name: '', timeZone: ownTimeZone(), hasEmail: true },
    submit: async (values) => {
      const { id } = await createClass(values);
      await queryClient.invalidateQueries({ queryKey: classesQuery.queryKey });
      await queryClient.invalidateQueries({ queryKey: viewerQuery.queryKey });
      await navigate(paths.class(id));
    },
  });
  return (
    <form onSubmit={onSubmit} noValidate className="mt-8 max-w-[26rem]">
      <h2>New class</h2>
      <TextField
        label="Name"
        hint="As your school calls it, such as 10C."
        error={errorOf('name')}
        {...form.register('name')}
      />
      <Select
        label="Time zone"
        options={timeZoneOptions()}
        error={errorOf('timeZone')}
        {...form.register('timeZone')}
      />
      <div className="mt-4">
        <Checkbox
          label="Students have e-mail"
          hint="Without it they sign in by a user name, and you hand out sign-in codes."
          {...form.register('hasEmail')}
        />
      </div>
      <FormError>{rootError}</FormError>
      <div className="acts mt-5">
        <Button kind="primary" type="submit" wide busy={isBusy}>
          Make the class
        </Button>
        <Button kind="quiet" small onClick={onCancel}>
          Not now
        </Button>
      </div>
    </form>
  );
}
