import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import type { HandInPreview } from '../../../shared/schemas/derivation.ts';
import { ApiProblem } from '../../lib/api.ts';
import { Button } from '../../ui/button.tsx';
import { Dialog } from '../../ui/dialog.tsx';
import { Maths } from '../../ui/maths.tsx';
import { showToast } from '../../ui/toast-store.ts';
import { readLines } from '../../../shared/maths/read-lines.ts';
import type { LineSettings } from './sheet-store.ts';
import { handInSheet, previewHandIn, sheetQuery } from './sheet.queries.ts';
import type { SheetSync } from './sheet-sync.ts';

interface HandInProps {
  readonly roundId: string;
  readonly sync: SheetSync | null;
  readonly settings: LineSettings;
  readonly isLate: boolean;
  readonly disabled: boolean;
}

/** Hands the sheet in, after showing exactly what will be posted. */
export function HandIn({ roundId, sync, settings, isLate, disabled }: HandInProps) {
  const queryClient = useQueryClient();
  const [preview, setPreview] = useState<HandInPreview | null>(null);
  const look = useMutation({
    mutationFn: async () => {
      await sync?.flush();
      return await previewHandIn(roundId);
    },
    onSuccess: setPreview,
  });
  const post = useMutation({
    mutationFn: (draftVersion: number) => handInSheet(roundId, draftVersion),
    onSuccess: (sheet) => {
      setPreview(null);
      queryClient.setQueryData(sheetQuery(roundId).queryKey, sheet);
      showToast('Derivation handed in.');
    },
    onError: (error) => {
      // What was shown is no longer what is saved: show it again.
      if (error instanceof ApiProblem && error.type === 'conflict') look.mutate();
    },
  });
  return (
    <>
      <Button kind="primary" wide busy={look.isPending} disabled={disabled} onClick={() => look.mutate()}>
        {isLate ? 'Hand in your derivation, late' : 'Hand in your derivation'}
      </Button>
      {look.isError ? (
        <p className="msg err" role="alert">
          It could not be handed in: it is not saved at school yet. Nothing you typed is lost.
        </p>
      ) : null}
      <Dialog
        isOpen={preview !== null}
        onClose={() => setPreview(null)}
        title="Hand in your derivation?"
        isLocked={post.isPending}
      >
        {preview ? <WhatIsPosted preview={preview} settings={settings} /> : null}
        {post.isError ? (
          <p className="msg err" role="alert">
            {post.error instanceof ApiProblem ? (post.error.detail ?? post.error.title) : 'It could not be handed in.'}
          </p>
        ) : null}
        <div className="acts">
          <Button
            kind="primary"
            busy={post.isPending}
            disabled={!preview || preview.lines.length < 2}
            onClick={() => preview && post.mutate(preview.draftVersion)}
          >
            Hand in
          </Button>
          <Button kind="quiet" small onClick={() => setPreview(null)}>
            Not yet
          </Button>
        </div>
      </Dialog>
    </>
  );
}

interface WhatIsPostedProps {
  readonly preview: HandInPreview;
  readonly settings: LineSettings;
}

function WhatIsPosted({ preview, settings }: WhatIsPostedProps) {
  const { lines, names, emptyLines } = preview;
  const readings = readLines(
    lines.map(({ tex }) => tex),
    settings,
  );
  const unread = readings.flatMap(({ ok }, number) => (ok ? [] : [number]));
  if (lines.length < 2) return <p className="small">Write at least one line before handing in.</p>;
  return (
    <div className="sheet-posted">
      <p className="small">This is what your reviewers will see, without your name:</p>
      <ol>
        {lines.map((line, number) => (
          <li key={line.stepId}>
            {line.prose ? <p className="small">{line.prose}</p> : null}
            <span className="no">{number === 0 ? 'given' : number}</span> <Maths tex={line.tex} display />
            {line.reason ? <span className="aside-words">{line.reason}</span> : null}
            {line.uses ? <span className="aside-words">from {line.uses.map(lineName).join(', ')}</span> : null}
          </li>
        ))}
      </ol>
      {names.length > 0 ? (
        <p className="small" role="alert">
          <b>A name from the class list stands in your words: {names.join(', ')}.</b> Reviewers must not learn whose
          this is: take it out, unless it is only a word.
        </p>
      ) : null}
      {unread.length > 0 ? (
        <p className="small">
          <b>
            {unread.length === 1
              ? `Line ${unread[0]} cannot be read.`
              : `Lines ${unread.slice(0, -1).join(', ')} and ${unread.at(-1)} cannot be read.`}
          </b>{' '}
          The steps to and from there stay undecided and go to your teacher.
        </p>
      ) : null}
      {emptyLines > 0 ? <p className="small muted">Lines without maths are left out.</p> : null}
    </div>
  );
}

const lineName = (number: number) => (number === 0 ? 'the given' : `line ${number}`);
