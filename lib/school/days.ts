import type { SchoolSettings } from './model';
import { fromLocal, showDate } from './times';

/** "1 December 2026" for a calendar day such as "2026-12-01". */
export function showDay(day: string, settings: Pick<SchoolSettings, 'zone' | 'locale'>): string {
  const time = fromLocal(day, settings);
  return time ? showDate(time, settings) : day;
}
