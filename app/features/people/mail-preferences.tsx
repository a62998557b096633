import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { api } from '../../lib/api.ts';
import { Switch } from '../../ui/choice.tsx';

interface Preference {
  readonly kind: string;
  readonly words: string;
  readonly wanted: boolean;
}

/** The kinds of letter that an account does not need. */
export function MailPreferences() {
  const queryClient = useQueryClient();
  const queryKey = ['mail-preferences'];
  const preferences = useQuery({
    queryKey,
    queryFn: ({ signal }) =>
      api.get<{ readonly preferences: readonly Preference[] }>('/api/mail-preferences', { signal }),
  });
  const save = useMutation({
    mutationFn: (form: { kind: string; wanted: boolean }) => api.put<void>('/api/mail-preferences', form),
    onSettled: () => queryClient.invalidateQueries({ queryKey }),
  });
  if (!preferences.data) return null;
  return (
    <section className="grid max-w-[26rem] gap-3">
      <h2>Letters</h2>
      {preferences.data.preferences.map((each) => (
        <Switch
          key={each.kind}
          label={each.words.charAt(0).toUpperCase() + each.words.slice(1)}
          checked={each.wanted}
          onChange={(event) => save.mutate({ kind: each.kind, wanted: event.target.checked })}
        />
      ))}
    </section>
  );
}
