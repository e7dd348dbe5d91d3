/**
 * Calls `end` once the process that started this one is gone (killed, so that it could not stop its children).
 * Does nothing unless the starter asked for it with FOLLOW_PARENT=1.
 */
export function followParent(end: () => void): void {
  if (process.env.FOLLOW_PARENT !== '1') return;
  const parent = process.ppid;
  const timer = setInterval(() => {
    if (process.ppid === parent) return;
    clearInterval(timer);
    end();
  }, 1000);
  timer.unref();
}
