import type { ReactNode } from 'react';

/** The shapes of states, 16 × 16, filled with the colour of their word. */
const shapes = {
  'sq-dashed': <path d="M2.2 2.2h11.6v11.6H2.2z" fill="none" stroke="currentColor" strokeWidth={1.8} strokeDasharray="2.9 2.9" strokeDashoffset={1.45} />,
  'sq-half': (
    <>
      <path d="M2.2 2.2h11.6v11.6H2.2z" fill="none" stroke="currentColor" strokeWidth={1.8} />
      <path d="M2.2 8h11.6v5.8H2.2z" />
    </>
  ),
  'check': <path d="M2 8.6l4 4 8-8.8" fill="none" stroke="currentColor" strokeWidth={2.2} />,
  'sq-strike': (
    <>
      <path d="M2.7 2.7h10.6v10.6H2.7z" fill="none" stroke="currentColor" strokeWidth={1.6} />
      <path d="M0 7.1h16v1.8H0z" />
    </>
  ),
  'planned': (
    <>
      <path d="M2.2 3.2h11.6v10.6H2.2z" fill="none" stroke="currentColor" strokeWidth={1.7} />
      <path d="M2.2 3.2h11.6v3.2H2.2zM4.4 1h1.7v3H4.4zM9.9 1h1.7v3H9.9z" />
    </>
  ),
  'in': (
    <>
      <path d="M6.5 2.2h6.9v11.6H6.5" fill="none" stroke="currentColor" strokeWidth={1.8} />
      <path d="M1 8h8.6M6.6 4.8L9.7 8l-3.1 3.2" fill="none" stroke="currentColor" strokeWidth={1.8} />
    </>
  ),
  'half': (
    <>
      <circle cx={8} cy={8} r={5.6} fill="none" stroke="currentColor" strokeWidth={1.8} />
      <path d="M8 2.4a5.6 5.6 0 0 1 0 11.2z" />
    </>
  ),
  'bars': <path d="M3 2h3.6v12H3zM9.4 2H13v12H9.4z" />,
  'sq': <path d="M1.8 1.8h12.4v12.4H1.8z" />,
  'check-ruled': (
    <>
      <path d="M3 5.4l3.2 3.2 6.8-7" fill="none" stroke="currentColor" strokeWidth={2.2} />
      <path d="M1.5 11h13v1.4h-13zM1.5 14h13v1.4h-13z" />
    </>
  ),
  'cross': <path d="M3 3l10 10M13 3L3 13" fill="none" stroke="currentColor" strokeWidth={2.2} />,
  'break': <path d="M0 8h4.2l2-5 3.6 10 2-5H16" fill="none" stroke="currentColor" strokeWidth={1.9} />,
  'ring-dashed': <circle cx={8} cy={8} r={5.6} fill="none" stroke="currentColor" strokeWidth={1.8} strokeDasharray="2.6 1.798" />,
  'ring-dot': (
    <>
      <circle cx={8} cy={8} r={5.6} fill="none" stroke="currentColor" strokeWidth={1.8} />
      <circle cx={8} cy={8} r={2.4} />
    </>
  ),
  'clock': (
    <>
      <circle cx={8} cy={8} r={6.1} fill="none" stroke="currentColor" strokeWidth={1.8} />
      <path d="M8 4.2V8h3.2" fill="none" stroke="currentColor" strokeWidth={1.8} />
    </>
  ),
  'door': (
    <>
      <path d="M9.5 2.2H2.6v11.6h6.9" fill="none" stroke="currentColor" strokeWidth={1.8} />
      <path d="M6 8h8.4M11.6 4.8L14.7 8l-3.1 3.2" fill="none" stroke="currentColor" strokeWidth={1.8} />
    </>
  ),
  'slash': (
    <>
      <circle cx={8} cy={8} r={5.6} fill="none" stroke="currentColor" strokeWidth={1.8} />
      <path d="M2.5 13.5l11-11" stroke="currentColor" strokeWidth={1.8} />
    </>
  ),
  'tri': <path d="M8 1.4L15.2 14.2H.8z" />,
  'speech': <path d="M1.5 2.5h13v8.5H8.2L4.5 14.3V11h-3z" />,
  'sq-bang': (
    <>
      <path d="M2.2 2.2h11.6v11.6H2.2z" fill="none" stroke="currentColor" strokeWidth={1.8} />
      <path d="M7.1 4.6h1.8v4.2H7.1zM7.1 10h1.8v1.8H7.1z" />
    </>
  ),
  'ring': <circle cx={8} cy={8} r={5.6} fill="none" stroke="currentColor" strokeWidth={1.8} />,
  'disc': <circle cx={8} cy={8} r={6.4} />,
  'flag': (
    <>
      <path d="M3 1.5h1.8v13H3z" />
      <path d="M4.8 2h9l-2.6 3.5L13.8 9h-9z" />
    </>
  ),
  'hourglass': (
    <>
      <path d="M3 2.2h10M3 13.8h10" stroke="currentColor" strokeWidth={1.8} />
      <path d="M4.4 2.8h7.2c0 3-2.6 3.7-2.6 5.2s2.6 2.2 2.6 5.2H4.4c0-3 2.6-3.7 2.6-5.2S4.4 5.8 4.4 2.8z" fill="none" stroke="currentColor" strokeWidth={1.5} />
      <path d="M5.6 12.8c.3-1.4 1.4-1.7 2.4-2.4 1 .7 2.1 1 2.4 2.4z" />
    </>
  ),
  'sq-out': (
    <>
      <path d="M7 2.2H2.2v11.6h11.6V9" fill="none" stroke="currentColor" strokeWidth={1.8} />
      <path d="M7.2 8.8L14 2M9.4 1.8h4.8v4.8" fill="none" stroke="currentColor" strokeWidth={1.8} />
    </>
  ),
  'plate': <path fillRule="evenodd" d="M2.5 2.5h11A1.5 1.5 0 0 1 15 4v8a1.5 1.5 0 0 1-1.5 1.5h-11A1.5 1.5 0 0 1 1 12V4a1.5 1.5 0 0 1 1.5-1.5zM3 4.3v1.8h1.8V4.3zM11.2 4.3v1.8H13V4.3zM3 9.9v1.8h1.8V9.9zM11.2 9.9v1.8H13V9.9z" />,
  'plates': (
    <>
      <path d="M4.5 1.8h10v8" fill="none" stroke="currentColor" strokeWidth={1.6} />
      <path fillRule="evenodd" d="M.5 5h11.5v9.2H.5zM2.2 6.6v1.6h1.6V6.6zM8.7 6.6v1.6h1.6V6.6zM2.2 11v1.6h1.6V11zM8.7 11v1.6h1.6V11z" />
    </>
  ),
  'lock': (
    <>
      <path d="M2.5 7h11v7.5h-11z" />
      <path d="M4.9 7V4.8a3.1 3.1 0 0 1 6.2 0V7" fill="none" stroke="currentColor" strokeWidth={1.8} />
    </>
  ),
  'tray': (
    <>
      <path d="M2 9h3.6l1 2h2.8l1-2H14v5H2z" />
      <path d="M8 1.5v5.2M5.4 4.4L8 7l2.6-2.6" fill="none" stroke="currentColor" strokeWidth={1.7} />
    </>
  ),
  'rows': (
    <>
      <path d="M2.2 2.2h11.6v11.6H2.2z" fill="none" stroke="currentColor" strokeWidth={1.7} />
      <path d="M4.6 5h6.8v1.4H4.6zM4.6 7.5h6.8v1.4H4.6zM4.6 10h4.2v1.4H4.6z" />
    </>
  ),
  'turn': (
    <>
      <path d="M13.2 9.4A5.4 5.4 0 1 1 11.8 4.2" fill="none" stroke="currentColor" strokeWidth={1.9} />
      <path d="M14.4 1.4v5H9.4z" />
    </>
  ),
  'up': <path d="M8 14.5v-11M3.2 8L8 3l4.8 5" fill="none" stroke="currentColor" strokeWidth={2} />,
  'sq-query': (
    <>
      <path d="M2.2 2.2h11.6v11.6H2.2z" fill="none" stroke="currentColor" strokeWidth={1.8} />
      <path d="M6 6.4c0-2.4 4.2-2.3 4 .100-.1 1.2-2 1.3-2 2.7" fill="none" stroke="currentColor" strokeWidth={1.5} />
      <path d="M7.2 10.4h1.7V12H7.2z" />
    </>
  ),
  'check-two': <path d="M.5 8.8l3.3 3.4 6-7.4M7.6 11.6l.8.8 6.9-7.6" fill="none" stroke="currentColor" strokeWidth={2} />,
  'arrow': <path d="M1 4h14L8 13z" />,
  'cup': (
    <>
      <path d="M2 3.5h9.2v5.7a3.4 3.4 0 0 1-3.4 3.4H5.4A3.4 3.4 0 0 1 2 9.2z" />
      <path d="M11 5h1.4a1.9 1.9 0 0 1 0 3.8H11M1.5 14.6h10.5" fill="none" stroke="currentColor" strokeWidth={1.5} />
    </>
  ),
} satisfies Record<string, ReactNode>;

export type ShapeName = keyof typeof shapes;

/** A shape alone says nothing to a screen reader: its word stands beside it. */
export function Shape({ name }: { name: ShapeName }) {
  return (
    <svg className="s" viewBox="0 0 16 16" aria-hidden="true" focusable="false">
      {shapes[name]}
    </svg>
  );
}
