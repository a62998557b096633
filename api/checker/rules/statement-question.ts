import type { CheckSettings } from '../../../shared/schemas/verdict.ts';
import type { CheckContext } from '../context.ts';
import type { Statement } from '../statements/statement.ts';

/** One step between two statements, and what the derivation knows besides. */
export interface StatementQuestion {
  readonly above: Statement;
  readonly below: Statement;
  readonly reference: Statement;
  /** Everything that earlier lines established, for systems. */
  readonly known: readonly Statement[];
  /** Letters of the given. */
  readonly givenLetters: readonly string[];
  /** The letter that the derivation is about, where settings or a later line name it. */
  readonly unknown: string | null;
  readonly isLast: boolean;
  /** The line that the task gave, and whether a step before this one failed. */
  readonly given: Statement | null;
  readonly afterFault: boolean;
  readonly settings: CheckSettings;
  readonly context: CheckContext;
}
