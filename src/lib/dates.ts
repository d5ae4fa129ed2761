import { writeClock as clock, writeDate, writeNumber } from "./formats.ts";

const MINUTE = 60_000;
const DAY = 24 * 60 * MINUTE;

const midnight = (date: Date) => new Date(date.getFullYear(), date.getMonth(), date.getDate()).getTime();

/** Midnights between two days; an hour's change of the clock does not count. */
const daysBetween = (then: Date, now: Date) => Math.round((midnight(now) - midnight(then)) / DAY);

function calendarDate(then: Date, now: Date): string {
  return writeDate(then, then.getFullYear() !== now.getFullYear());
}

/** A date to come or gone by: "15 December", with its year when that is another. */
export function dateInWords(instant: string | number | Date, now = new Date()): string {
  return calendarDate(new Date(instant), now);
}

/** A clock time today, a weekday this week, a date after: "14:08", "Tuesday", "9 March". */
export function whenInWords(instant: string | number | Date, now = new Date()): string {
  const then = new Date(instant);
  const days = daysBetween(then, now);
  if (days <= 0) return clock(then);
  if (days < 7) return then.toLocaleDateString("en-GB", { weekday: "long" });
  return calendarDate(then, now);
}

/** A clock time, whatever the day: "14:08". */
export const clockTime = (instant: string | number | Date): string => clock(new Date(instant));

/** A day: "Today", "Yesterday", "Tuesday", "9 March". */
export function dayInWords(instant: string | number | Date, now = new Date()): string {
  const then = new Date(instant);
  const days = daysBetween(then, now);
  if (days <= 0) return "Today";
  return days === 1 ? "Yesterday" : whenInWords(then, now);
}

/** A moment to the minute, gone by or to come: "14:08" today, "Tuesday 14:08" in the past week, "9 March, 14:08". */
export function momentInWords(instant: string | number | Date, now = new Date()): string {
  const then = new Date(instant);
  const days = daysBetween(then, now);
  if (days === 0) return clock(then);
  return days > 0 && days < 7
    ? `${whenInWords(then, now)} ${clock(then)}`
    : `${calendarDate(then, now)}, ${clock(then)}`;
}

/** A moment for the record, whenever it is read: "9 March 2032 at 16:20". */
export function fullMoment(instant: string | number | Date): string {
  const then = new Date(instant);
  return `${writeDate(then, true)} at ${clock(then)}`;
}

/** How long ago a change was: "2 minutes ago", "at 9:05", "yesterday", "on Tuesday", "on 4 March". */
export function agoInWords(instant: string | number | Date, now = new Date()): string {
  const then = new Date(instant);
  const minutes = Math.floor((now.getTime() - then.getTime()) / MINUTE);
  const days = daysBetween(then, now);
  if (minutes < 1) return "just now";
  if (minutes < 60) return minutes === 1 ? "a minute ago" : `${minutes} minutes ago`;
  if (days <= 0) return `at ${clock(then)}`;
  if (days === 1) return "yesterday";
  return days < 7 ? `on ${whenInWords(then, now)}` : calendarDate(then, now);
}

/** How long something took, or will: "40 ms", "1.6 s", "20 s", "3 min". */
export function durationInWords(milliseconds: number): string {
  if (milliseconds < 100) return `${Math.max(1, Math.round(milliseconds))} ms`;
  if (milliseconds < 9_950) {
    const tenths = Math.round(milliseconds / 100);
    return `${writeNumber(tenths / 10, tenths % 10 === 0 ? 0 : 1)} s`;
  }
  if (milliseconds < 90_000) return `${Math.round(milliseconds / 1000)} s`;
  return `${Math.round(milliseconds / MINUTE)} min`;
}

/** An estimate of a duration, never finer than it is known: "less than a second", "about 20 s". */
export function aboutInWords(milliseconds: number): string {
  if (milliseconds < 1000) return "less than a second";
  const seconds = milliseconds / 1000;
  if (seconds < 10) return `about ${Math.round(seconds)} s`;
  if (seconds < 90) return `about ${Math.round(seconds / 5) * 5} s`;
  return `about ${Math.round(seconds / 60)} min`;
}

/** A running clock: "0:14". */
export function elapsedClock(milliseconds: number): string {
  const seconds = Math.floor(milliseconds / 1000);
  return `${Math.floor(seconds / 60)}:${String(seconds % 60).padStart(2, "0")}`;
}
