import { queryOptions } from '@tanstack/react-query';
import type { TaskAnswer, TaskChange, TaskForm, TaskListItem } from '../../../shared/schemas/task.ts';
import { api } from '../../lib/api.ts';

export const tasksQuery = queryOptions({
  queryKey: ['tasks'],
  queryFn: ({ signal }) => api.get<readonly TaskListItem[]>('/api/tasks', { signal }),
});

export const taskQuery = (taskId: string) =>
  queryOptions({
    queryKey: ['tasks', taskId],
    queryFn: ({ signal }) => api.get<TaskAnswer>(`/api/tasks/${taskId}`, { signal }),
    // A form is filled from it: it must not change under the hands.
    staleTime: Infinity,
    gcTime: 0,
  });

export const createTask = (form: TaskForm) => api.post<{ readonly id: string }>('/api/tasks', form);
export const changeTask = (taskId: string, form: TaskChange) => api.put<TaskAnswer>(`/api/tasks/${taskId}`, form);
export const copyTask = (taskId: string) => api.post<{ readonly id: string }>(`/api/tasks/${taskId}/copy`);
export const archiveTask = (taskId: string, archived: boolean) =>
  api.put<void>(`/api/tasks/${taskId}/archived`, { archived });
