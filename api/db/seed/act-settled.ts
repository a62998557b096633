import type { MendView } from '../../../shared/schemas/derivation.ts';
import { toDocument } from './act-writing.ts';
import { toLine } from './demo-task.ts';
import { minutesAfter, type PlayedRound } from './played-round.ts';
import { chanceOf, forEach } from './seed-world.ts';

async function findDerivations({ world, id }: PlayedRound): Promise<Map<string, string>> {
  const rows: { id: string; author: string }[] = await world.db.query(
    'select id, author_id as author from derivation where round_id = $1 and current_version_id is not null',
    [id],
  );
  return new Map(rows.map((row) => [row.author, row.id]));
}

/** Most authors with a first fault mend their derivations within a day or two. */
export async function writeMends(round: PlayedRound): Promise<void> {
  const { world, of, plan, settlesAt, sheets } = round;
  const derivations = await findDerivations(round);
  const { sheets: all, form } = plan.task;
  const end = toLine(all[0]?.lines.at(-1) ?? '').tex;
  await forEach(of.students, async ({ viewer, person }) => {
    const slip = sheets.get(viewer.userId)?.slip;
    const derivationId = derivations.get(viewer.userId);
    const random = chanceOf('mend', form.title, person.name);
    if (!slip || !derivationId || random() < 0.3 || plan.noMend?.includes(person.name)) return;
    const at = minutesAfter(settlesAt, 60 + 1800 * random());
    await world.clock.at(at, async () => {
      const path = `/derivations/${derivationId}/mend`;
      const { draft } = await world.call<MendView>(viewer, 'get', path);
      const lines = slip.shouldBe === end ? [end] : [slip.shouldBe, end];
      const document = toDocument(lines, `mend/${form.title}/${person.name}`);
      const saved = await world.call<{ version: number }>(viewer, 'put', path, {
        document,
        baseVersion: draft.version,
      });
      await world.call(viewer, 'post', `${path}/hand-in`, { draftVersion: saved.version });
    });
  });
  await world.runUntil(minutesAfter(settlesAt, 2000));
}

/** An author who does not agree with the verdict says so within the week. */
export async function contestVerdict(round: PlayedRound): Promise<void> {
  const { world, of, plan, settlesAt, sheets } = round;
  const author = of.students.find(({ person }) => person.name === plan.contestsVerdict?.name);
  const derivationId = author && (await findDerivations(round)).get(author.viewer.userId);
  const step = author && sheets.get(author.viewer.userId)?.slip?.step;
  if (!plan.contestsVerdict || !derivationId || step === undefined) return;
  const { words } = plan.contestsVerdict;
  await world.clock.at(minutesAfter(settlesAt, 26 * 60), () =>
    world.call(author.viewer, 'post', `/derivations/${derivationId}/contest`, { step, words }),
  );
}
