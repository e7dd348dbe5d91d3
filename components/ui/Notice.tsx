import type { ReactNode } from 'react';
import { Shape, type ShapeName } from './Shape';

export type NoticeKind = 'ok' | 'info' | 'wait' | 'stop';
const shapes: Record<NoticeKind, ShapeName> = { ok: 'check', info: 'speech', wait: 'sq-bang', stop: 'tri' };

/**
 * Stands where its matter is; there are no toasts. `live` announces it to a screen reader when it appears
 * (stop at once, the others when there is a pause). `action` is one quiet Button.
 */
export function Notice(props: { kind: NoticeKind; title?: string; live?: boolean; action?: ReactNode; children?: ReactNode }) {
  const { kind, title, live, action, children } = props;
  const role = live ? (kind === 'stop' ? 'alert' : 'status') : undefined;
  return (
    <div className={`notice notice--${kind}`} role={role}>
      <Shape name={shapes[kind]} />
      <div>
        {title && <b>{title} </b>}
        {children}
      </div>
      {action && <div className="notice__do">{action}</div>}
    </div>
  );
}
