/** An account may carry a last day: it ends with that day, at midnight in the workshop's time zone. */

const HALF_DAY_MS = 43_200_000;

/** The calendar day in a time zone, as year-month-day. */
function dayAt(timeZone: string, at: number): string {
  return new Intl.DateTimeFormat("en-CA", { timeZone, year: "numeric", month: "2-digit", day: "2-digit" }).format(at);
}

/** The first millisecond after this day there, whatever the clocks do in that night. `day` is year-month-day. */
export function endOfDay(day: string, timeZone: string): Date {
  const noon = Date.parse(`${day}T12:00:00Z`);
  // zones lie from 12 hours behind to 14 ahead: the day is not over there before this, and over after that
  let [low, high] = [noon - HALF_DAY_MS, noon + 2 * HALF_DAY_MS + HALF_DAY_MS];
  while (high - low > 1) {
    const middle = Math.floor((low + high) / 2);
    if (dayAt(timeZone, middle) > day) high = middle;
    else low = middle;
  }
  return new Date(high);
}

/** The other way: the last day of an account that ends at this moment. */
export function lastDayOf(endsAt: Date, timeZone: string): string {
  return dayAt(timeZone, endsAt.getTime() - 1);
}

const MONTHS = ["January", "February", "March", "April", "May", "June", "July", "August", "September", "October", "November", "December"];

/** "2027-01-31" is "31 January 2027". */
export function dayInWords(day: string): string {
  const [year, month, date] = day.split("-").map(Number);
  return `${date} ${MONTHS[month - 1]} ${year}`;
}
