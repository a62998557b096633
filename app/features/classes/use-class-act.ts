import { useMutation, useQueryClient } from '@tanstack/react-query';
import { showToast } from '../../ui/toast-store.ts';
import { problemWords } from '../../ui/states.tsx';

/** One act on a class: says what was done, or why it was not, and shows the class anew. */
export function useClassAct<Input = void, Output = unknown>(act: (input: Input) => Promise<Output>, done?: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: act,
    onSuccess: async () => {
      await queryClient.invalidateQueries({ queryKey: ['classes'] });
      if (done) showToast(done);
    },
    onError: (error) => showToast(problemWords(error).detail || problemWords(error).title),
  });
}
