import type { SheetDocument } from '../../../shared/schemas/sheet.ts';
import type { DemoStudent } from './cast.ts';
import { toLine, type DemoSheet } from './demo-task.ts';
import type { PlayedRound } from './played-round.ts';
import type { AtWork } from './round-plan.ts';
import { between } from './seed-times.ts';
import { chanceOf, choose, forEach, idOf, type Actor } from './seed-world.ts';

/** Everybody who takes part writes and hands in; while writing is open, people are as far as the plan says. */
export async function writeDerivations(round: PlayedRound): Promise<void> {
  const { of, plan, world } = round;
  const away = new Set([
    ...(plan.absent ?? []),
    ...(plan.excused ?? []),
    ...(plan.extended ? [plan.extended.name] : []),
  ]);
  if (round.writingEndsAt > world.present) {
    await forEach(plan.atWork ?? [], (work) => workOn(round, work));
    return;
  }
  await forEach(of.students, async (student) => {
    if (!away.has(student.person.name)) await handInAtLeisure(round, student);
  });
}

async function handInAtLeisure(round: PlayedRound, student: Actor<DemoStudent>): Promise<void> {
  const { plan, opensAt, writingEndsAt } = round;
  const { name } = student.person;
  const random = chanceOf('write', plan.task.form.title, name);
  const sheet = chooseSheet(round, student.person);
  const begins = between(opensAt, writingEndsAt, 0.05 + 0.75 * random());
  await save(round, student, sheet, begins);
  await handIn(round, student, new Date(begins.getTime() + (6 + 40 * random()) * 60_000));
}

/** How far somebody is while writing is open. */
async function workOn(round: PlayedRound, { name, sheet: index, lineAgo, savedAgo }: AtWork): Promise<void> {
  const { of, plan, world, opensAt } = round;
  const student = of.students.find(({ person }) => person.name === name);
  const sheet = plan.task.sheets[index];
  if (!student || !sheet) throw new Error(`Nobody is called ${name}, or nothing is written`);
  if (lineAgo === undefined || savedAgo === undefined) {
    const begins = between(opensAt, world.present, 0.1 + 0.5 * chanceOf('work', name)());
    await save(round, student, sheet, begins);
    await handIn(round, student, new Date(begins.getTime() + 11 * 60_000));
    return;
  }
  const ago = (minutes: number) => new Date(world.present.getTime() - minutes * 60_000);
  await save(round, student, sheet, ago(lineAgo));
  // Whoever is stuck goes on changing the last reason.
  if (savedAgo < lineAgo) await save(round, student, sheet, ago(savedAgo), 'does this lead anywhere?');
}

function chooseSheet({ plan }: PlayedRound, { name, care }: DemoStudent): DemoSheet {
  const { sheets, form } = plan.task;
  const random = chanceOf('sheet', form.title, name);
  const named = plan.writes?.[name];
  // What waits for a ruling is written by those whom the plan names, and by nobody else.
  const free = sheets.filter(({ rulings, unfinished }) => !rulings && !unfinished);
  const wanted = random() < care ? free.filter(({ slip }) => !slip) : free.filter(({ slip }) => slip);
  return (named === undefined ? undefined : sheets[named]) ?? choose(wanted, random);
}

async function save(
  round: PlayedRound,
  { viewer, person }: Actor<DemoStudent>,
  sheet: DemoSheet,
  at: Date,
  lastReason = '',
): Promise<void> {
  const { world, id, sheets } = round;
  sheets.set(viewer.userId, sheet);
  const document = toDocument(sheet.lines, `${round.plan.task.form.title}/${person.name}`, lastReason);
  // A sheet begins with version 1; whoever saves again saves over 2.
  const body = { document, baseVersion: lastReason === '' ? 1 : 2 };
  await world.clock.at(at, () => world.call(viewer, 'put', `/rounds/${id}/sheet`, body));
}

async function handIn({ world, id }: PlayedRound, { viewer }: Actor<DemoStudent>, at: Date): Promise<void> {
  await world.clock.at(at, () => world.call(viewer, 'post', `/rounds/${id}/sheet/hand-in`, { draftVersion: 2 }));
}

/** Lines as the editor keeps them. */
export function toDocument(lines: readonly string[], seed: string, lastReason = ''): SheetDocument {
  return {
    type: 'doc',
    content: lines.map((line, i) => {
      const { tex, reason } = toLine(line);
      const stepId = idOf('step', seed, i);
      return {
        type: 'step',
        attrs: { stepId, tex, reason: i === lines.length - 1 ? lastReason || reason : reason, uses: null },
      };
    }),
  };
}
