/** Once for each server process, before its first request. */
export async function register(): Promise<void> {
  if (process.env.NEXT_RUNTIME !== 'nodejs') return;
  const [{ config }, { prepareShutdown }] = await Promise.all([import('@/lib/config'), import('@/lib/live/shutdown')]);
  // Wrong settings are told now, not at somebody's first request.
  config();
  prepareShutdown();
}
