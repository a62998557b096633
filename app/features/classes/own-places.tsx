import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { problemWords } from '../../ui/states.tsx';
import { Button } from '../../ui/button.tsx';
import { RadioGroup } from '../../ui/choice.tsx';
import { aliasesQuery, changeAlias, ownPlaceQuery } from './classes.queries.ts';

interface Place {
  readonly id: string;
  readonly name: string;
  readonly role: 'teacher' | 'assistant' | 'student';
  readonly alias: string | null;
}

/** One's classes, and in each the alias under which classmates may meet one in the standings. */
export function OwnPlaces({ classes }: { readonly classes: readonly Place[] }) {
  if (classes.length === 0) return null;
  return (
    <section>
      <h2>Your classes</h2>
      <ul className="mt-3 grid gap-4">
        {classes.map((place) => (
          <li key={place.id}>
            <b>{place.name}</b> <span className="muted">· {place.role}</span>
            {place.role === 'student' ? <AliasChoice place={place} /> : null}
          </li>
        ))}
      </ul>
    </section>
  );
}

function AliasChoice({ place }: { readonly place: Place }) {
  const [open, setOpen] = useState(false);
  const own = useQuery(ownPlaceQuery(place.id));
  if (!own.data) return null;
  return (
    <div className="small">
      Your alias is <b>{own.data.alias}</b>. Standings show it in place of your name.{' '}
      {own.data.aliasChangeable ? (
        <Button kind="quiet" small aria-expanded={open} onClick={() => setOpen(!open)}>
          Choose another
        </Button>
      ) : (
        <span className="muted">It can be changed again next term.</span>
      )}
      {open && own.data.aliasChangeable ? <AliasForm classId={place.id} onDone={() => setOpen(false)} /> : null}
    </div>
  );
}

function AliasForm({ classId, onDone }: { readonly classId: string; readonly onDone: () => void }) {
  const offers = useQuery(aliasesQuery(classId));
  const [alias, setAlias] = useState<string | null>(null);
  const queryClient = useQueryClient();
  const save = useMutation({
    mutationFn: (chosen: string) => changeAlias(classId, chosen),
    onSuccess: async () => {
      await queryClient.invalidateQueries({ queryKey: ['own-place', classId] });
      await queryClient.invalidateQueries({ queryKey: ['viewer'] });
      onDone();
    },
  });
  if (!offers.data) return null;
  return (
    <div className="mt-3">
      <RadioGroup
        label="Six free aliases; you can change once a term"
        options={offers.data.aliases.map((each) => ({ value: each, label: each }))}
        value={alias}
        onChange={setAlias}
        error={save.error ? problemWords(save.error).detail : undefined}
      />
      <div className="acts mt-3">
        <Button disabled={!alias} busy={save.isPending} onClick={() => alias && save.mutate(alias)}>
          Take this alias
        </Button>
      </div>
    </div>
  );
}
