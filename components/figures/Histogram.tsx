/** Values from `from` up to, not with, `to` (the last with it): how many. */
export type Bin = { from: number; to: number; count: number };
/** A value pointed at on the axis ("key", "pass mark"). */
export type HistogramMark = { at: number; label: string };

// As wide as the panes it stands in, so that its text keeps its size.
const box = { width: 340, height: 160, left: 36, right: 8, top: 18, bottom: 30 };

const shown = (value: number): string => Number(value.toPrecision(4)).toString().replace('-', '−');

/** Whole steps of the count axis: at most five lines. */
function countSteps(most: number): number[] {
  const rough = Math.max(1, most / 4);
  const power = 10 ** Math.floor(Math.log10(rough));
  const step = Math.max(1, ([1, 2, 5, 10].find((n) => n * power >= rough) ?? 10) * power);
  return Array.from({ length: Math.floor(most / step) + 1 }, (_, n) => n * step);
}

function BinTable({ bins, unit, counted }: { bins: readonly Bin[]; unit: string; counted: string }) {
  return (
    <details>
      <summary>Show as a table</summary>
      <table className="ledger">
        <thead>
          <tr>
            <th scope="col" className="n">
              From{unit && `, ${unit}`}
            </th>
            <th scope="col" className="n">
              To{unit && `, ${unit}`}
            </th>
            <th scope="col" className="n dbl">
              {counted}
            </th>
          </tr>
        </thead>
        <tbody>
          {bins.map((bin) => (
            <tr key={bin.from}>
              <td className="n" data-head="From">{shown(bin.from)}</td>
              <td className="n" data-head="To">{shown(bin.to)}</td>
              <td className="n dbl" data-head={counted}>{bin.count}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </details>
  );
}

/**
 * How values spread: `title` says what and over how many, `unit` is the value's unit as printed, `counted` what a
 * bar counts ("Draws"). Bars of equal width; the same figures stand in a table behind a button.
 */
export function Histogram({ title, unit = '', counted, bins, marks = [] }: { title: string; unit?: string; counted: string; bins: readonly Bin[]; marks?: readonly HistogramMark[] }) {
  const low = bins[0]?.from ?? 0;
  const high = bins.at(-1)?.to ?? 1;
  const most = Math.max(1, ...bins.map((bin) => bin.count));
  const x = (value: number) => box.left + ((value - low) / (high - low || 1)) * (box.width - box.left - box.right);
  const y = (count: number) => box.height - box.bottom - (count / most) * (box.height - box.top - box.bottom);
  const base = y(0);
  return (
    <figure className="figure">
      <figcaption>{title}</figcaption>
      <svg viewBox={`0 0 ${box.width} ${box.height}`} role="img" aria-label={`${title}. From ${shown(low)} to ${shown(high)} ${unit}, at most ${most} in one bar.`}>
        {countSteps(most).map((count) => (
          <g key={count}>
            <line className="grid" x1={box.left} x2={box.width - box.right} y1={y(count)} y2={y(count)} />
            <text x={box.left - 8} y={y(count) + 4} textAnchor="end">
              {count}
            </text>
          </g>
        ))}
        {bins.map((bin) => (
          <rect key={bin.from} className="bar" x={x(bin.from) + 0.5} width={Math.max(0.5, x(bin.to) - x(bin.from) - 1)} y={y(bin.count)} height={base - y(bin.count)} />
        ))}
        <line className="axis" x1={box.left} x2={box.width - box.right} y1={base} y2={base} />
        {[low, (low + high) / 2, high].map((value, place) => (
          <text key={value} x={x(value)} y={base + 18} textAnchor={(['start', 'middle', 'end'] as const)[place]}>
            {shown(value)} {unit}
          </text>
        ))}
        {marks.map((mark) => (
          <g key={mark.label}>
            <line className="axis" x1={x(mark.at)} x2={x(mark.at)} y1={box.top - 4} y2={base} strokeDasharray="4 3" />
            <text className="title" x={x(mark.at)} y={box.top - 8} textAnchor="middle">
              {mark.label}
            </text>
          </g>
        ))}
      </svg>
      <BinTable bins={bins} unit={unit} counted={counted} />
    </figure>
  );
}
