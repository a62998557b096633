import type { AuthorDerivation } from '../../../shared/schemas/review.ts';
import { countWord } from '../../lib/finding-words.ts';
import { Both } from '../../ui/page.tsx';
import { Answered } from './answer-desk.tsx';
import { FindingNote } from './finding-note.tsx';

/** What the reviewers found, once the round is settled. */
export function FoundList({ derivation }: { readonly derivation: AuthorDerivation }) {
  const { findings, lines } = derivation;
  if (findings.length === 0) {
    return (
      <Both className="found">
        <p className="small muted">Nobody handed in a finding on this derivation.</p>
      </Both>
    );
  }
  return (
    <Both className="found">
      <h2>What your {findings.length === 1 ? 'reviewer' : `${countWord(findings.length)} reviewers`} found</h2>
      <div className="f2">
        {findings.map((finding) => (
          <FindingNote key={finding.key} finding={finding} lines={lines}>
            <Answered finding={finding} />
          </FindingNote>
        ))}
      </div>
    </Both>
  );
}
