import { taskArchiveSchema, taskChangeSchema, taskFormSchema } from '../../../shared/schemas/task.ts';
import { reply, route, type Route } from '../../http/route.ts';
import type { TasksService } from './tasks.service.ts';

export function tasksRoutes(tasks: TasksService): Route[] {
  return [
    route({ method: 'get', path: '/tasks', who: 'teacher', handle: ({ viewer }) => tasks.listTasks(viewer) }),
    route({
      method: 'post',
      path: '/tasks',
      who: 'teacher',
      body: taskFormSchema,
      handle: async ({ viewer, body }) => reply({ status: 201, body: await tasks.createTask(viewer, body) }),
    }),
    route({
      method: 'get',
      path: '/tasks/:taskId',
      who: 'teacher',
      handle: ({ viewer, params }) => tasks.getTask(viewer, params['taskId'] ?? ''),
    }),
    route({
      method: 'put',
      path: '/tasks/:taskId',
      who: 'teacher',
      body: taskChangeSchema,
      handle: ({ viewer, params, body }) => tasks.changeTask(viewer, params['taskId'] ?? '', body),
    }),
    route({
      method: 'post',
      path: '/tasks/:taskId/copy',
      who: 'teacher',
      handle: async ({ viewer, params }) =>
        reply({ status: 201, body: await tasks.copyTask(viewer, params['taskId'] ?? '') }),
    }),
    route({
      method: 'put',
      path: '/tasks/:taskId/archived',
      who: 'teacher',
      body: taskArchiveSchema,
      handle: ({ viewer, params, body }) => tasks.archiveTask(viewer, params['taskId'] ?? '', body.archived),
    }),
  ];
}
