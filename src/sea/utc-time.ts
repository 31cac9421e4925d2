// Moments in universal time as whole minutes since 2000-01-01 00:00, so that records can be ordered and blended.

const DAYS_BEFORE_MONTH = [0, 31, 59, 90, 120, 151, 181, 212, 243, 273, 304, 334];
const MINUTES_PER_DAY = 1440;

/** `2020-06-08T03:50Z`; a space for the T, seconds of zero and a missing Z are accepted. */
export const UTC_TIME: RegExp = /^\s*(\d{4})-(\d{2})-(\d{2})[T ](\d{2}):(\d{2})(?::00)?\s*(?:Z|UTC)?\s*$/;

/** The minutes of a text such as `2020-06-08T03:50Z`; null where it is no moment of the calendar. */
export function utcMinutesFromText(text: string): number | null {
  const match = UTC_TIME.exec(text);
  if (match === null) return null;
  const [year, month, day, hour, minute] = match.slice(1).map(Number);
  return utcMinutes(year, month, day, hour, minute);
}

/** Minutes since 2000-01-01 00:00 of a moment of the Gregorian calendar; null where there is none. */
export function utcMinutes(
  year: number,
  month: number,
  day: number,
  hour: number,
  minute: number,
): number | null {
  if (!(year >= 1900 && year < 2200 && month >= 1 && month <= 12)) return null;
  if (!(day >= 1 && day <= daysInMonth(year, month) && hour <= 23 && minute <= 59)) return null;
  return (daysBeforeYear(year) + dayOfYear(year, month, day)) * MINUTES_PER_DAY + 60 * hour + minute;
}

/** Minutes as a text: `2020-06-08 03:50 UTC`. */
export function utcText(minutes: number): string {
  let day = Math.floor(minutes / MINUTES_PER_DAY);
  const rest = minutes - day * MINUTES_PER_DAY;
  let year = 1900;
  while (daysBeforeYear(year + 1) <= day) year++;
  day -= daysBeforeYear(year);
  let month = 12;
  while (dayOfYear(year, month, 1) > day) month--;
  day -= dayOfYear(year, month, 1) - 1;
  const two = (value: number): string => String(value).padStart(2, '0');
  return `${year}-${two(month)}-${two(day)} ${two(Math.floor(rest / 60))}:${two(rest % 60)} UTC`;
}

function isLeap(year: number): boolean {
  return (year % 4 === 0 && year % 100 !== 0) || year % 400 === 0;
}

function daysInMonth(year: number, month: number): number {
  if (month === 12) return 31;
  return DAYS_BEFORE_MONTH[month] - DAYS_BEFORE_MONTH[month - 1] + (month === 2 && isLeap(year) ? 1 : 0);
}

/** Days from 2000-01-01 to the first of January of a year. */
function daysBeforeYear(year: number): number {
  const y = year - 1;
  const leaps = Math.floor(y / 4) - Math.floor(y / 100) + Math.floor(y / 400);
  return 365 * (year - 2000) + leaps - LEAPS_BEFORE_2000;
}

const LEAPS_BEFORE_2000 = 499 - 19 + 4;

/** 0 on the first of January. */
function dayOfYear(year: number, month: number, day: number): number {
  return DAYS_BEFORE_MONTH[month - 1] + day - 1 + (month > 2 && isLeap(year) ? 1 : 0);
}
