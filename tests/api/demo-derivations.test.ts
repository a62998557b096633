import { describe, expect, it } from 'vitest';
import { checkDerivation } from '../../api/checker/rule-derivation.ts';
import { toLine, type DemoSheet, type DemoTask } from '../../api/db/seed/demo-task.ts';
import * as equations from '../../api/db/seed/tasks/equations.ts';
import * as firstYear from '../../api/db/seed/tasks/first-year.ts';
import * as fractions from '../../api/db/seed/tasks/fractions.ts';
import * as products from '../../api/db/seed/tasks/products.ts';
import { toCheckInput } from '../../api/features/verdicts/check-input.ts';
import { taskFormSchema } from '../../shared/schemas/task.ts';

const tasks: [string, DemoTask][] = Object.entries({ ...products, ...fractions, ...equations, ...firstYear });

function rule({ form }: DemoTask, lines: readonly string[]) {
  const all = [form.given, ...lines.map((line) => toLine(line).tex)];
  return checkDerivation(
    toCheckInput(
      form,
      all.map((tex) => ({ tex, uses: null })),
    ),
  );
}

function expected({ rulings, slip }: DemoSheet): string {
  if (rulings) return 'undecided';
  return slip ? `faulty at ${slip.step}` : 'sound';
}

describe.each(tasks)('the derivations of %s', (_name, task) => {
  it('stand on a task that can be set', () => {
    expect(taskFormSchema.parse(task.form)).toEqual(task.form);
  });

  it('are ruled as the demo tells it', () => {
    const finished = task.sheets.filter(({ unfinished }) => !unfinished);
    const ruled = finished.map(({ lines }) => {
      const { outcome, firstFault } = rule(task, lines);
      return firstFault === null ? outcome : `${outcome} at ${firstFault}`;
    });
    expect(ruled).toEqual(finished.map(expected));
  });

  it('have marked parts that stand in their lines, and mends that hold', () => {
    const end = toLine(task.sheets[0]?.lines.at(-1) ?? '').tex;
    for (const { lines, slip, rulings } of task.sheets) {
      if (!slip) continue;
      expect(toLine(lines[slip.step - 1] ?? '').tex).toContain(slip.mark ?? '');
      if (!rulings) expect(rule(task, [...lines.slice(0, slip.step - 1), slip.shouldBe, end]).outcome).toBe('sound');
    }
  });
});
