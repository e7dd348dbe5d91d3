/**
 * Registers the worker that keeps the room's shell, and gives it what this window loaded before the worker was there.
 * Without a secure address there is none: the room then works, but cannot be reloaded without network.
 */
export async function keepShell(): Promise<void> {
  if (!('serviceWorker' in navigator)) return;
  await navigator.serviceWorker.register('/room-worker.js', { scope: '/sit/' });
  const { active } = await navigator.serviceWorker.ready;
  const loaded = performance.getEntriesByType('resource').map((entry) => entry.name).filter((name) => name.includes('/_next/static/'));
  active?.postMessage({ kind: 'keep', urls: [location.pathname, ...loaded] });
}
