import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { TaskList } from '../features/tasks/task-list.tsx';
import { tasksQuery } from '../features/tasks/tasks.queries.ts';
import { paths } from '../lib/paths.ts';
import { Button, LinkButton } from '../ui/button.tsx';
import { Head, Page } from '../ui/page.tsx';
import { EmptyState, ErrorState, Waiting } from '../ui/states.tsx';

/** A teacher's collection of tasks. */
export function Component() {
  const tasks = useQuery(tasksQuery);
  const [showsArchived, setShowsArchived] = useState(false);
  const open = tasks.data?.filter(({ archived }) => !archived) ?? [];
  const archived = tasks.data?.filter((task) => task.archived) ?? [];
  return (
    <Page wide>
      <Head
        h1="Your tasks"
        lead="What is to be derived; each can be used in many rounds."
        acts={
          <LinkButton kind="primary" to={paths.task('new')}>
            Write a task
          </LinkButton>
        }
      />
      {tasks.isPending ? <Waiting lines={4} /> : null}
      {tasks.isError ? <ErrorState error={tasks.error} onRetry={() => void tasks.refetch()} /> : null}
      {tasks.data && open.length === 0 ? (
        <EmptyState title="No task yet">
          A task is a given line and a goal. Write one, then plan a round with it.
        </EmptyState>
      ) : null}
      {open.length > 0 ? <TaskList tasks={open} /> : null}
      {archived.length > 0 ? (
        <section className="mt-12">
          <Button kind="quiet" small aria-expanded={showsArchived} onClick={() => setShowsArchived(!showsArchived)}>
            {showsArchived ? 'Hide what is put away' : `Show ${archived.length} put away`}
          </Button>
          {showsArchived ? <TaskList tasks={archived} /> : null}
        </section>
      ) : null}
    </Page>
  );
}
