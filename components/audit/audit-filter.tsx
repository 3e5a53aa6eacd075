import { Button, buttonClass, ButtonLink } from "@/components/ui/button";
import { Icon } from "@/components/ui/icon";
import { Input } from "@/components/ui/input";
import { Select, type Option } from "@/components/ui/select";
import { withCommas } from "@/lib/core/quantity";
import { MAX_CSV_ROWS } from "@/lib/limits";
import type { AuditInput } from "@/lib/schemas/audit";

/** The address of a list with these filters, without what is left as it is. */
export function auditQuery(input: AuditInput, more: Record<string, string> = {}): string {
  const { q, what, who, from, to } = input;
  return new URLSearchParams(Object.entries({ q, what, who, from, to, ...more }).filter(([, value]) => value !== "")).toString();
}

/** What of a list is shown: a plain form, so that the address says it; and the list as a file. */
export function AuditFilter({ list, path, input, total, words, what, who, days = false }: {
  /** its name in the interface */
  list: string;
  path: string;
  input: AuditInput;
  total: number;
  /** label of the field for words; null without one */
  words: { label: string; placeholder?: string } | null;
  what?: { label: string; options: readonly Option[] };
  who?: readonly string[];
  days?: boolean;
}) {
  const filtered = auditQuery(input) !== "";
  const tooMany = total > MAX_CSV_ROWS;
  return (
    <div className="no-print flex flex-wrap items-end justify-between gap-x-6 gap-y-3 pb-4">
      <form action={path} role="search" aria-label="This list" className="flex flex-wrap items-end gap-3" key={auditQuery(input)}>
        {words ? <Input label={words.label} name="q" defaultValue={input.q} maxLength={200} autoComplete="off" placeholder={words.placeholder} className="w-[230px] max-w-full" /> : null}
        {what ? <Select label={what.label} name="what" defaultValue={input.what} options={[{ value: "", label: "All" }, ...what.options]} className="w-[170px]" /> : null}
        {who ? <Select label="Who" name="who" defaultValue={input.who} options={[{ value: "", label: "Anyone" }, ...who.map((value) => ({ value, label: value }))]} className="w-[170px]" /> : null}
        {days ? <><Input type="date" label="From" name="from" defaultValue={input.from} className="w-[150px]" /><Input type="date" label="To, with that day" name="to" defaultValue={input.to} className="w-[150px]" /></> : null}
        {input.sort ? <><input type="hidden" name="sort" value={input.sort} /><input type="hidden" name="order" value={input.order} /></> : null}
        <Button type="submit">Show</Button>
        {filtered ? <ButtonLink variant="text" href={path}>Show all</ButtonLink> : null}
      </form>
      {tooMany ? <Button disabled reason={`A file holds ${withCommas(MAX_CSV_ROWS)} rows at most: narrow the list first.`}>Save as CSV</Button>
        : <a className={buttonClass({})} href={`/api/audit/${list}?${auditQuery(input, { format: "csv" })}`} download><Icon name="down" />Save as CSV</a>}
    </div>
  );
}

/** Nothing here: because of the filter, or because there is nothing yet. */
export function isFiltered(input: AuditInput): boolean {
  return auditQuery(input) !== "";
}
