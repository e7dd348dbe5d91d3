/** The last minutes: the numerals stand in brass and can no longer be hidden [s]. */
export const lastSeconds = 300;
const minute = 60;
const announcedMinutes = [10, 5, 1];

/** Seconds as h:mm:ss; what is gone is 0:00:00. */
export function clockText(seconds: number): string {
  const left = Math.max(0, Math.floor(seconds));
  const two = (n: number) => String(n).padStart(2, '0');
  return `${Math.floor(left / 3600)}:${two(Math.floor(left / minute) % minute)}:${two(left % minute)}`;
}

/** The minutes to announce when the clock went from `before` to `now` seconds, or null. */
export function crossedMinutes(before: number, now: number): number | null {
  return announcedMinutes.find((minutes) => before > minutes * minute && now <= minutes * minute && now > (minutes - 1) * minute) ?? null;
}

/** A time of day, "11:25", in the zone that lies `zoneOffset` minutes east of UTC. */
export const timeIn = (time: number, zoneOffset: number): string => new Date(time + zoneOffset * 60_000).toISOString().slice(11, 16);
