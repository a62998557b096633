import { useMutation, useQueryClient } from '@tanstack/react-query';
import { problemWords } from '../../ui/states.tsx';
import { showToast } from '../../ui/toast-store.ts';

/** One act on a round: says what was done and looks at the round again; why it was not done stays in `error`. */
export function useRoundAct<Input = void, Output = unknown>(
  act: (input: Input) => Promise<Output>,
  done: string | ((output: Output) => string),
  after?: () => void,
) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: act,
    onSuccess: async (output) => {
      await Promise.all(['rounds', 'today'].map((name) => queryClient.invalidateQueries({ queryKey: [name] })));
      showToast(typeof done === 'string' ? done : done(output));
      after?.();
    },
  });
}

/** Why an act was refused, in one sentence. */
export function refusalOf(error: unknown): string | undefined {
  if (!error) return undefined;
  const { title, detail } = problemWords(error);
  return detail || title;
}
