import { classNames } from './class-names.ts';
import type { EdgeRow, Knot, Stroke } from './edge-strokes.ts';

/** A stretch of the edge; without a viewBox its stroke grows with the row, so nothing has to be measured. */
function Stretch({ stroke, cap }: { stroke: Stroke; cap?: 'top' | 'bottom' }) {
  return (
    <svg className={classNames('sg', `s-${stroke}`, cap && `cap-${cap}`)} aria-hidden="true">
      <line x1="24" x2="24" y1="0" y2="100%" />
    </svg>
  );
}

function KnotPiece({ knot }: { knot: Knot }) {
  return (
    <svg className={classNames('nk', knot === 'also-fails' && 'second')} viewBox="0 0 38 26" aria-hidden="true">
      {knot === 'fault' ? <path className="notch" d="M24 -0.5 L24 0 L11 13 L24 26 L24 26.5" /> : null}
      {knot === 'also-fails' ? <path d="M24 0 L24 5 L16 13 L24 21 L24 26" /> : null}
      {knot === 'undecided' ? (
        <text x="24" y="19">
          ?
        </text>
      ) : null}
    </svg>
  );
}

/** The three columns of one row of the edge: the step above the line, the line with its tick, and whatever height is left. */
export function EdgeColumn({ row }: { row: EdgeRow }) {
  const { step, upper, lower, tick, isArm } = row;
  const endsHere = lower === 'none';
  return (
    <>
      {step ? (
        <span className="e e-step">
          <Stretch stroke={step.above} />
          {step.knot ? <KnotPiece knot={step.knot} /> : null}
          {step.knot ? <Stretch stroke={step.below} /> : null}
        </span>
      ) : null}
      <span className="e e-line">
        <Stretch stroke={upper} cap={endsHere ? 'bottom' : undefined} />
        <Stretch stroke={lower} cap={upper === 'none' ? 'top' : undefined} />
        {tick ? <i className={classNames('tick', `t-${tick}`, isArm && 'arm')} /> : null}
      </span>
      {endsHere ? null : (
        <span className="e e-rest">
          <Stretch stroke={lower} />
        </span>
      )}
    </>
  );
}

/** The second, mended edge beside the broken one. */
export function MendColumn({ isFirst, isLast }: { isFirst: boolean; isLast: boolean }) {
  return (
    <>
      <span className="e e-step">
        {isFirst ? <Stretch stroke="none" /> : null}
        <Stretch stroke="holds" />
      </span>
      <span className="e e-line">
        <Stretch stroke="holds" cap={isLast ? 'bottom' : undefined} />
        <Stretch stroke={isLast ? 'none' : 'holds'} />
        <i className="tick" />
      </span>
      {isLast ? null : (
        <span className="e e-rest">
          <Stretch stroke="holds" />
        </span>
      )}
    </>
  );
}
