import { DateTime } from 'luxon';
import type { SchoolSettings } from './model';

type Place = Pick<SchoolSettings, 'zone' | 'locale'>;
const at = (time: Date, place: Place) => DateTime.fromJSDate(time, { zone: place.zone }).setLocale(place.locale);

/** "1 December 2026" in the school's zone. */
export const showDate = (time: Date, place: Place): string => at(time, place).toFormat('d LLLL yyyy');
/** "1 Dec 14:20", for ledgers. */
export const showMoment = (time: Date, place: Place): string => at(time, place).toFormat('d LLL HH:mm');
/** "14:20". */
export const showTime = (time: Date, place: Place): string => at(time, place).toFormat('HH:mm');
/** "14:20:07". */
export const showSecond = (time: Date, place: Place): string => at(time, place).toFormat('HH:mm:ss');
/** "Tuesday 1 December 2026, 14:20 Mountain Standard Time": an appointment, with the zone written out. */
export const showAppointment = (time: Date, place: Place): string => `${at(time, place).toFormat('cccc d LLLL yyyy, HH:mm')} ${zoneName(time, place)}`;
/** Minutes east of UTC at that time: what a browser is given, so that it needs no table of zones. */
export const zoneOffset = (time: Date, place: Pick<Place, 'zone'>): number => DateTime.fromJSDate(time, { zone: place.zone }).offset;
/** "Tue 1 Dec", for plates. */
export const showShortDay = (time: Date, place: Place): string => at(time, place).toFormat('ccc d LLL');
/** "Tuesday 1 December". */
export const showDay = (time: Date, place: Place): string => at(time, place).toFormat('cccc d LLLL');
/** "Mountain Standard Time". */
export const zoneName = (time: Date, place: Place): string => at(time, place).toFormat('ZZZZZ');
/** The calendar day in the school's zone, "2026-12-01". */
export const localDay = (time: Date, place: Place): string => at(time, place).toISODate() ?? '';
/** "2026-12-01T14:20", what a date-and-time field holds. */
export const toLocal = (time: Date, place: Place): string => at(time, place).toFormat("yyyy-LL-dd'T'HH:mm");
/** Reads what a date-and-time field holds as a time in the school's zone; null when it is no time there. */
export function fromLocal(text: string, place: Pick<Place, 'zone'>): Date | null {
  const time = DateTime.fromISO(text, { zone: place.zone });
  return time.isValid ? time.toJSDate() : null;
}
