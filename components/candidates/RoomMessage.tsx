import type { ReactNode } from 'react';
import type { RoomCover } from '@/lib/candidates/model';

/** The sheet when there is nothing to work on: waiting, stopped, ended, moved. Says what is so and what to do. */
export function RoomMessage({ title, cover, children, action }: { title: string; cover: RoomCover | null; children: ReactNode; action?: ReactNode }) {
  return (
    <div className="room">
      <main className="room__main" id="main" tabIndex={-1}>
        <div className="sheet room__body room__message">
          {cover && <p className="soft t15">{cover.title} · room {cover.room} · {cover.candidateName}</p>}
          <h1>{title}</h1>
          <div className="prose" role="status">{children}</div>
          {action && <div className="btn-row">{action}</div>}
        </div>
      </main>
    </div>
  );
}
