/** share: 0 to 1. says: the figure as printed ("34.5 of 40"). low: under what is asked; hatched, and said in words by `lowSays`. */
export type Share = { label: string; share: number; says: string; low?: boolean };

/** Shares of a whole, one bar a line: marks by area, answers by option. The figure stands in words beside the bar. */
export function ShareBars({ label, shares, lowSays = 'under what is asked' }: { label: string; shares: readonly Share[]; lowSays?: string }) {
  return (
    <ul className="shares" aria-label={label}>
      {shares.map((one) => (
        <li key={one.label} className={one.low ? 'is-low' : undefined}>
          <span>{one.label}</span>
          <span className="track" aria-hidden="true">
            <i style={{ width: `${Math.max(0, Math.min(1, one.share)) * 100}%` }} />
          </span>
          <b>
            {one.says}
            {one.low && <span className="c-wait"> · {lowSays}</span>}
          </b>
        </li>
      ))}
    </ul>
  );
}
