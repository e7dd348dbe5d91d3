import type { ReactNode } from 'react';

/**
 * The exam room: no navigation. `bar` is the TimeBar on the top edge; `who` the candidate and the exam;
 * `clock`; `right` what is sending and Hand in; `foot` the tools and Back, Next. The sheet is `children`.
 */
export function RoomShell(props: { bar: ReactNode; head: { who: ReactNode; clock: ReactNode; right: ReactNode }; foot?: ReactNode; children: ReactNode }) {
  return (
    <div className="room">
      {props.bar}
      <header className="room__head">
        <div className="room__who">{props.head.who}</div>
        {props.head.clock}
        <div className="room__right">{props.head.right}</div>
      </header>
      <main className="room__main" id="main" tabIndex={-1}>
        {props.children}
      </main>
      {props.foot && (
        <footer className="room__foot">
          <div>{props.foot}</div>
        </footer>
      )}
    </div>
  );
}
