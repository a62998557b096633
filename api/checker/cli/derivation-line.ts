import { z } from 'zod';
import { checkSettingsSchema, type DerivationInput } from '../../../shared/schemas/verdict.ts';

const example = '{"id":"1","lines":["x+x","2x"]}';

const texts = (error: string) => z.array(z.string('write TeX in quotation marks'), error);

const lineSchema = z.object(
  {
    id: z.union([z.string(), z.number()], { error: 'write a text or a number, or leave it out' }).nullish(),
    lines: texts('write a list of TeX, the given first, such as ["x+x","2x"]')
      .min(1, 'write at least the given line')
      .max(1000, 'write at most 1000 lines'),
    assume: texts('write a list of conditions in TeX, such as ["x>0"]')
      .max(50, 'write at most 50 conditions')
      .nullish(),
    uses: z
      .array(z.array(z.number().int().min(0)).nullable(), {
        error: 'write for each line a list of the lines that it follows from, or null for the line above',
      })
      .nullish(),
    settings: z.preprocess(plainSettings, checkSettingsSchema.nullish()),
  },
  { error: `write an object, such as ${example}` },
);

const kindsOfGoal: ReadonlySet<string> = new Set(['free', 'expanded', 'factored', 'simplified']);

/** Short forms that a person types: a goal by its name or as the target's TeX, `presentation: true`, the decimal sign. */
function plainSettings(settings: unknown): unknown {
  if (typeof settings !== 'object' || settings === null) return settings;
  const plain: Record<string, unknown> = { ...settings };
  if (typeof plain.presentation === 'boolean') plain.presentation = plain.presentation ? 'note' : undefined;
  if (plain.decimal === ',') plain.decimal = 'comma';
  if (plain.decimal === '.') plain.decimal = 'point';
  if (plain.goal === 'solved') plain.goal = { kind: 'solved' };
  if (typeof plain.goal === 'string')
    plain.goal = kindsOfGoal.has(plain.goal) ? { kind: plain.goal } : { kind: 'target', target: plain.goal };
  if (typeof plain.goal === 'object' && plain.goal !== null && 'kind' in plain.goal && plain.goal.kind === 'solved')
    plain.goal = { letter: plain.unknown ?? 'x', ...plain.goal };
  return plain;
}

export type DerivationLine =
  | { readonly ok: true; readonly id: string | number | null; readonly input: DerivationInput }
  | { readonly ok: false; readonly id: string | number | null; readonly message: string };

/** One line of the command's input. */
export function parseDerivationLine(text: string): DerivationLine {
  let data: unknown;
  try {
    data = JSON.parse(text.replace(/^\uFEFF/, ''));
  } catch (cause) {
    const why = cause instanceof Error ? ` (${cause.message})` : '';
    return { ok: false, id: null, message: `not JSON${why}: write one object a line, such as ${example}` };
  }
  const parsed = lineSchema.safeParse(data);
  if (!parsed.success) {
    const issue = parsed.error.issues[0];
    return {
      ok: false,
      id: idOf(data),
      message: `${issue?.path.join('.') || 'line'}: ${issue?.message ?? 'not a derivation'}`,
    };
  }
  const { id, lines, assume, uses, settings } = parsed.data;
  return {
    ok: true,
    id: id ?? null,
    input: { lines, assume: assume ?? [], settings: settings ?? {}, ...(uses ? { uses } : {}) },
  };
}

function idOf(data: unknown): string | number | null {
  if (typeof data !== 'object' || data === null || !('id' in data)) return null;
  return typeof data.id === 'string' || typeof data.id === 'number' ? data.id : null;
}
