/** A name of chance for this browser; the seat is bound to it. Kept until the browser's data are cleared. */
export function deviceName(): string {
  const kept = localStorage.getItem('device');
  if (kept && /^[A-Za-z0-9_-]{16,64}$/.test(kept)) return kept;
  const made = Array.from(crypto.getRandomValues(new Uint8Array(16)), (byte) => byte.toString(16).padStart(2, '0')).join('');
  localStorage.setItem('device', made);
  return made;
}

/** Whose paper of a sitting was last open here: where a reload without network finds it. */
export const placeOnDevice = {
  read: (sittingId: string): string | null => localStorage.getItem(`room:${sittingId}`),
  keep: (sittingId: string, place: string): void => localStorage.setItem(`room:${sittingId}`, place),
  forget: (sittingId: string): void => localStorage.removeItem(`room:${sittingId}`),
};

/**
 * Holds the room of a sitting for this window until `release` resolves; false when another window of this browser has it.
 * Over plain http there are no locks: two windows then both write, and the sequence numbers keep the answers apart.
 */
export async function holdRoom(sittingId: string, release: Promise<void>): Promise<boolean> {
  if (!navigator.locks) return true;
  return new Promise((resolve) => {
    void navigator.locks.request(`room-${sittingId}`, { ifAvailable: true }, (lock) => {
      resolve(lock !== null);
      return lock ? release : undefined;
    });
  });
}
