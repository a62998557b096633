/** A stretch of time with a name. */
export interface TimeStretch {
  readonly id: string;
  readonly name: string;
  /** When it begins and ends, ISO. */
  readonly from: string;
  readonly to: string;
  /** Its times in words. */
  readonly words: string;
}

export interface TimeEdgeProps {
  readonly label: string;
  readonly stretches: readonly TimeStretch[];
  /** ISO; no mark where it lies outside. */
  readonly now: string;
  readonly nowWords: string;
  /** Named after the last stretch, at its end. */
  readonly end?: { readonly name: string; readonly words: string };
}

/** Each stretch gets at least this share, so that its words have room. */
const LEAST_SHARE = 0.16;
const END_SHARE = 0.15;

interface Placed extends TimeStretch {
  readonly start: number;
  readonly share: number;
}

/** Shares of the width by length of time, with a floor; `total` of them together. */
function place(stretches: readonly TimeStretch[], total: number): readonly Placed[] {
  const lengths = stretches.map(({ from, to }) => Math.max(1, Date.parse(to) - Date.parse(from)));
  const sum = lengths.reduce((all, each) => all + each, 0);
  const floor = Math.min(LEAST_SHARE, total / stretches.length);
  const raised = lengths.map((length) => Math.max(floor, (length / sum) * total));
  const spare = raised.reduce((all, each) => all + each, 0);
  let start = 0;
  return stretches.map((stretch, index) => {
    const share = ((raised[index] ?? 0) / spare) * total;
    const placed = { ...stretch, start, share };
    start += share;
    return placed;
  });
}

function shareAt(placed: readonly Placed[], now: string): number | null {
  const at = placed.find(({ from, to }) => from <= now && now < to);
  if (!at) return null;
  const part = (Date.parse(now) - Date.parse(at.from)) / Math.max(1, Date.parse(at.to) - Date.parse(at.from));
  return at.start + part * at.share;
}

const percent = (share: number) => `${(share * 100).toFixed(2)}%`;

/** Times along an edge laid flat: filled up to now, a tick where each stretch begins. Not to scale where stretches are short. */
export function TimeEdge({ label, stretches, now, nowWords, end }: TimeEdgeProps) {
  const total = end ? 1 - END_SHARE : 1;
  const sorted = stretches.map((each) => ({
    ...each,
    from: new Date(each.from).toISOString(),
    to: new Date(each.to).toISOString(),
  }));
  const instant = new Date(now).toISOString();
  const placed = place(sorted, total);
  const at = shareAt(placed, instant);
  const done = at ?? (instant < (sorted[0]?.from ?? '') ? 0 : 1);
  return (
    <div className="time-edge">
      {at === null ? null : (
        <p className="time-now" style={{ left: percent(at) }}>
          <b>{nowWords}</b>
        </p>
      )}
      <svg aria-hidden="true">
        <line className="base" x1="0" x2="100%" y1="9" y2="9" />
        <line className="done" x1="0" x2={percent(done)} y1="9" y2="9" />
        {placed.map((each) => (
          <line key={each.id} className="tick-v" x1={percent(each.start)} x2={percent(each.start)} y1="2" y2="16" />
        ))}
        {end ? <line className="tick-v" x1={percent(total)} x2={percent(total)} y1="2" y2="16" /> : null}
      </svg>
      <ol
        aria-label={label}
        style={{
          gridTemplateColumns: [...placed.map((each) => `${each.share}fr`), ...(end ? [`${END_SHARE}fr`] : [])].join(
            ' ',
          ),
        }}
      >
        {placed.map((each) => (
          <li
            key={each.id}
            aria-current={at !== null && each.from <= instant && instant < each.to ? 'step' : undefined}
          >
            <b>{each.name}</b> <span className="num">{each.words}</span>
          </li>
        ))}
        {end ? (
          <li>
            <b>{end.name}</b> <span className="num">{end.words}</span>
          </li>
        ) : null}
      </ol>
    </div>
  );
}
