import { useMutation, useQueryClient } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import type { TaskListItem } from '../../../shared/schemas/task.ts';
import { paths } from '../../lib/paths.ts';
import { Button, LinkButton } from '../../ui/button.tsx';
import { Maths } from '../../ui/maths.tsx';
import { problemWords } from '../../ui/states.tsx';
import { showToast } from '../../ui/toast-store.ts';
import { sayGoal } from './task-words.ts';
import { archiveTask, copyTask } from './tasks.queries.ts';
import './tasks.css';

/** A teacher's tasks, each with its given line and what can be done with it. */
export function TaskList({ tasks }: { readonly tasks: readonly TaskListItem[] }) {
  return (
    <ul className="task-rows">
      {tasks.map((task) => (
        <TaskRow key={task.id} task={task} />
      ))}
    </ul>
  );
}

function useTaskAct(act: () => Promise<unknown>, done: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: act,
    onSuccess: async () => {
      await queryClient.invalidateQueries({ queryKey: ['tasks'], exact: true });
      showToast(done);
    },
    onError: (error) => showToast(problemWords(error).detail || problemWords(error).title),
  });
}

function TaskRow({ task }: { readonly task: TaskListItem }) {
  const copy = useTaskAct(() => copyTask(task.id), `“${task.title}” is copied.`);
  const archive = useTaskAct(
    () => archiveTask(task.id, !task.archived),
    task.archived ? `“${task.title}” is back.` : `“${task.title}” is put away.`,
  );
  const rounds = task.rounds === 0 ? 'not used yet' : `${task.rounds} ${task.rounds === 1 ? 'round' : 'rounds'}`;
  return (
    <li>
      <div>
        <h2>
          <Link to={paths.task(task.id)}>{task.title}</Link>
        </h2>
        <p className="small muted">
          {sayGoal(task.goal)} · {rounds}
        </p>
      </div>
      <div className="given">
        <Maths tex={task.given} size="line" />
      </div>
      <div className="acts">
        {task.archived ? null : (
          <LinkButton to={paths.newRound({ taskId: task.id })} small>
            Plan a round
          </LinkButton>
        )}
        <Button
          kind="quiet"
          small
          busy={copy.isPending}
          aria-label={`Copy ${task.title}`}
          onClick={() => copy.mutate()}
        >
          Copy
        </Button>
        <Button
          kind="quiet"
          small
          busy={archive.isPending}
          aria-label={`${task.archived ? 'Take out' : 'Put away'} ${task.title}`}
          onClick={() => archive.mutate()}
        >
          {task.archived ? 'Take out' : 'Put away'}
        </Button>
      </div>
    </li>
  );
}
