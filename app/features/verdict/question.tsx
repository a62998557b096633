import { useState } from 'react';
import { Button } from '../../ui/button.tsx';
import { Notice } from '../../ui/notice.tsx';
import { problemWords } from '../../ui/states.tsx';
import { TextArea } from '../../ui/text-field.tsx';

export interface QuestionProps {
  readonly question: string;
  readonly answer: string | null;
  readonly onAnswer: (answer: string) => Promise<unknown>;
}

/** What the teacher asks the author before ruling. */
export function Question({ question, answer, onAnswer }: QuestionProps) {
  const [words, setWords] = useState('');
  const [error, setError] = useState<string>();
  const send = async () => {
    try {
      await onAnswer(words);
    } catch (problem) {
      setError(problemWords(problem).detail);
    }
  };
  return (
    <Notice kind="plum" title="Your teacher asks:">
      “{question}”
      {answer === null ? (
        <form
          className="stack mt-3"
          onSubmit={(event) => {
            event.preventDefault();
            void send();
          }}
        >
          <TextArea
            label="Your reply"
            rows={3}
            maxLength={2000}
            value={words}
            error={error}
            onChange={(event) => setWords(event.currentTarget.value)}
          />
          <Button type="submit" disabled={words.trim() === ''}>
            Reply
          </Button>
        </form>
      ) : (
        <p className="mt-2">You replied: “{answer}”</p>
      )}
    </Notice>
  );
}
