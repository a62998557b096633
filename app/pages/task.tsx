import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useCallback, useState } from 'react';
import { useNavigate, useParams } from 'react-router-dom';
import type { TaskAnswer, TaskForm as Terms } from '../../shared/schemas/task.ts';
import { TryIt, type TryItProps } from '../features/derivations/try-it.tsx';
import { TaskForm } from '../features/tasks/task-form.tsx';
import { EMPTY_TASK } from '../features/tasks/task-words.ts';
import { changeTask, createTask, taskQuery } from '../features/tasks/tasks.queries.ts';
import { ApiProblem } from '../lib/api.ts';
import { paths } from '../lib/paths.ts';
import { LinkButton } from '../ui/button.tsx';
import { Head, Page } from '../ui/page.tsx';
import { EmptyState, ErrorState, Waiting } from '../ui/states.tsx';
import { showToast } from '../ui/toast-store.ts';
import { NotFound } from './not-found.tsx';

/** Writing a task, with a place beside it to try a model derivation. */
export function Component() {
  const { taskId = 'new' } = useParams();
  return taskId === 'new' ? <NewTask /> : <OldTask key={taskId} taskId={taskId} />;
}

function NewTask() {
  const navigate = useNavigate();
  const queryClient = useQueryClient();
  return (
    <Desk
      h1="Write a task"
      initial={EMPTY_TASK}
      submitLabel="Keep this task"
      onSubmit={async (form) => {
        const { id } = await createTask(form);
        await queryClient.invalidateQueries({ queryKey: ['tasks'], exact: true });
        showToast('The task is in your collection.');
        await navigate(paths.task(id), { replace: true });
      }}
    />
  );
}

function OldTask({ taskId }: { readonly taskId: string }) {
  const task = useQuery(taskQuery(taskId));
  if (task.error instanceof ApiProblem && task.error.type === 'not-found') return <NotFound />;
  if (!task.data) {
    return (
      <Page wide>
        <div className="head">
          {task.isError ? <ErrorState error={task.error} onRetry={() => void task.refetch()} /> : <Waiting lines={5} />}
        </div>
      </Page>
    );
  }
  return <Edit task={task.data} />;
}

function Edit({ task }: { readonly task: TaskAnswer }) {
  const queryClient = useQueryClient();
  const [version, setVersion] = useState(task.version);
  const [initial] = useState<Terms>(task);
  const used = task.rounds > 0 ? ' Rounds that have opened keep the task as it was.' : '';
  return (
    <Desk
      h1={task.title}
      lead={used.trim() || undefined}
      initial={initial}
      submitLabel="Save"
      taskId={task.id}
      onSubmit={async (form) => {
        const saved = await changeTask(task.id, { ...form, version });
        setVersion(saved.version);
        await queryClient.invalidateQueries({ queryKey: ['tasks'], exact: true });
        showToast('Saved.');
      }}
    />
  );
}

/** The terms as far as they are complete: a half-written goal or assumption does not stop anybody from trying. */
function toTried({ given, goal, assumptions, settings }: Terms): TryItProps['task'] {
  const isOpen = (goal.kind === 'solved' && goal.letter === '') || (goal.kind === 'target' && goal.target === '');
  return {
    given,
    goal: isOpen ? { kind: 'free' } : goal,
    assumptions: assumptions.filter((tex) => tex.trim() !== ''),
    settings,
  };
}

interface DeskProps {
  readonly h1: string;
  readonly lead?: string;
  readonly initial: Terms;
  readonly submitLabel: string;
  readonly taskId?: string;
  readonly onSubmit: (form: Terms) => Promise<void>;
}

function Desk({ h1, lead, initial, submitLabel, taskId, onSubmit }: DeskProps) {
  const [terms, setTerms] = useState(initial);
  const follow = useCallback((next: Terms) => setTerms(next), []);
  return (
    <Page wide>
      <Head h1={h1} lead={lead} />
      <div className="task-split">
        <TaskForm
          initial={initial}
          submitLabel={submitLabel}
          onSubmit={onSubmit}
          onTerms={follow}
          acts={
            taskId ? (
              <LinkButton to={paths.newRound({ taskId })} small>
                Plan a round with it
              </LinkButton>
            ) : null
          }
        />
        <aside className="beside-task" aria-labelledby="try-it">
          <h2 id="try-it">Try it</h2>
          <p className="small muted mt-1 mb-4">
            Write a model derivation and see how each line is read and ruled. Nothing of it is kept.
          </p>
          {terms.given.trim() === '' ? (
            <EmptyState title="Write the given line first">Line 1 then follows from it.</EmptyState>
          ) : (
            <TryIt task={toTried(terms)} />
          )}
        </aside>
      </div>
    </Page>
  );
}
