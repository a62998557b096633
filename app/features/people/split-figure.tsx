import { Derivation } from '../../ui/derivation.tsx';

const LINES = [
  { id: '0', tex: '(5-k)^2-(k+1)^2' },
  { id: '1', tex: '25-10k+k^2-(k+1)^2', state: 'holds' },
  { id: '2', tex: '25-10k+k^2-k^2+2k+1', state: 'fault' },
  { id: '3', tex: '26-8k', state: 'carried' },
] as const;

/** What the product is about, in one picture. */
export default function SplitFigure() {
  return (
    <>
      <Derivation lines={LINES} label="A derivation whose second step does not follow" layout="narrow" />
      <p className="cap">Everything holds along the edge, until one step does not.</p>
    </>
  );
}
