import ICAL from 'ical.js';

export type Appointment = {
  /** Unique for ever: the same for every edition of one appointment. */
  uid: string;
  title: string;
  room: string;
  opensAt: Date;
  startsAt: Date;
  endsAt: Date;
  /** When this edition was made; a later one replaces an earlier one. */
  madeAt: Date;
  link: string;
};

/** One appointment as iCalendar (RFC 5545), times in UTC. */
export function calendarEntry(appointment: Appointment): string {
  const calendar = new ICAL.Component(['vcalendar', [], []]);
  calendar.updatePropertyWithValue('version', '2.0');
  calendar.updatePropertyWithValue('prodid', '-//Fullfield//Sittings//EN');
  calendar.updatePropertyWithValue('method', 'PUBLISH');
  const event = new ICAL.Component('vevent');
  const time = (date: Date) => ICAL.Time.fromJSDate(date, true);
  event.updatePropertyWithValue('uid', appointment.uid);
  event.updatePropertyWithValue('dtstamp', time(appointment.madeAt));
  event.updatePropertyWithValue('sequence', Math.floor(appointment.madeAt.getTime() / 1000) % 2 ** 31);
  event.updatePropertyWithValue('dtstart', time(appointment.startsAt));
  event.updatePropertyWithValue('dtend', time(appointment.endsAt));
  event.updatePropertyWithValue('summary', appointment.title);
  event.updatePropertyWithValue('location', appointment.room);
  event.updatePropertyWithValue('url', appointment.link);
  calendar.addSubcomponent(event);
  return calendar.toString();
}
