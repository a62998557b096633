import { z } from 'zod';
import { checkSettingsSchema, type DerivationInput } from '../../../shared/schemas/verdict.ts';

const lineSchema = z.object({
  id: z.union([z.string(), z.number()]).nullish(),
  lines: z.array(z.string()).min(1).max(1000),
  assume: z.array(z.string()).max(50).nullish(),
  uses: z.array(z.array(z.number().int().min(0)).nullable()).nullish(),
  settings: checkSettingsSchema.nullish(),
});

export type DerivationLine =
  | { readonly ok: true; readonly id: string | number | null; readonly input: DerivationInput }
  | { readonly ok: false; readonly id: string | number | null; readonly message: string };

/** One line of the command's input. */
export function parseDerivationLine(text: string): DerivationLine {
  let data: unknown;
  try {
    data = JSON.parse(text);
  } catch (cause) {
    return { ok: false, id: null, message: cause instanceof Error ? cause.message : 'not JSON' };
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
