/**
 * Times on screen: the workshop's zone, 24 h. Parts are put together by hand because the punctuation of
 * Intl differs between the server's and the browser's data, and the page would not match itself.
 */
type Field = "weekday" | "day" | "month" | "year" | "hour" | "minute" | "second";

function parts(iso: string, timeZone: string): Record<Field, string> {
  const format = new Intl.DateTimeFormat("en-GB", {
    timeZone, weekday: "short", day: "numeric", month: "short", year: "numeric",
    hour: "2-digit", minute: "2-digit", second: "2-digit", hourCycle: "h23",
  });
  const out: Record<Field, string> = { weekday: "", day: "", month: "", year: "", hour: "", minute: "", second: "" };
  for (const { type, value } of format.formatToParts(new Date(iso))) {
    if (type in out) out[type as Field] = value;
  }
  // "Sept" in one data set, "Sep" in another
  out.month = out.month.slice(0, 3);
  return out;
}

/** "Thu 12 Mar" */
export function dayText(iso: string, timeZone: string): string {
  const p = parts(iso, timeZone);
  return `${p.weekday} ${p.day} ${p.month}`;
}

/** "Thu 12 Mar 2026": where it leaves the house */
export function dayYearText(iso: string, timeZone: string): string {
  return `${dayText(iso, timeZone)} ${parts(iso, timeZone).year}`;
}

/** "12 Mar, 13:48" */
export function momentText(iso: string, timeZone: string): string {
  const p = parts(iso, timeZone);
  return `${p.day} ${p.month}, ${p.hour}:${p.minute}`;
}

/** "12 Mar 2026, 13:48:05": the log */
export function exactText(iso: string, timeZone: string): string {
  const p = parts(iso, timeZone);
  return `${p.day} ${p.month} ${p.year}, ${p.hour}:${p.minute}:${p.second}`;
}

/** "14:20" */
export function clockText(iso: string, timeZone: string): string {
  const p = parts(iso, timeZone);
  return `${p.hour}:${p.minute}`;
}

/** A due date is a plain calendar day ("2026-03-12"), the same in every zone: "Thu 12 Mar". */
export function dueText(dueOn: string): string {
  return dayText(`${dueOn.slice(0, 10)}T12:00:00Z`, "UTC");
}
