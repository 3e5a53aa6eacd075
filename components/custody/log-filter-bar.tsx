import { Input } from "@/components/ui/input";
import { Select } from "@/components/ui/select";
import type { CustodyEntryView } from "@/lib/views";
import { entriesText } from "./entries-text";
import { filterQuery, groupsIn, LOG_KINDS, type LogFilter, ofKind, WHOLE_LOG } from "./log-words";

const distinct = (values: string[]) => [...new Set(values.filter(Boolean))].sort();

/** What of the log is shown: kind, group of steps, who, where, words; how many that are, and the address that keeps the choice. */
export function LogFilterBar({ entries, shown, filter, onChange }: { entries: readonly CustodyEntryView[]; shown: number; filter: LogFilter; onChange(filter: LogFilter): void }) {
  const filtered = filterQuery(filter) !== "";
  const options = (all: string, values: string[]) => [{ value: "", label: all }, ...distinct(values).map((value) => ({ value, label: value }))];
  return (
    <div className="no-print flex flex-wrap items-end gap-x-4 gap-y-2 pb-2">
      <div className="seg" role="group" aria-label="Kind of entry">
        {LOG_KINDS.map(({ key, label }) => (
          <button key={key} type="button" aria-pressed={filter.kind === key} onClick={() => onChange({ ...filter, kind: key })}>
            {label} <span className="ml-1 font-mono">{entries.filter((entry) => ofKind(entry, key)).length}</span>
          </button>
        ))}
      </div>
      <Select label="Steps" className="w-[190px]" value={filter.group} options={[{ value: "", label: "All steps" }, ...groupsIn(entries).map(({ key, label, count }) => ({ value: key, label: `${label} (${count})` }))]} onChange={(event) => onChange({ ...filter, group: event.target.value })} />
      <Select label="Who" className="w-[150px]" value={filter.who} options={options("Anyone", entries.map((e) => e.actor.name))} onChange={(event) => onChange({ ...filter, who: event.target.value })} />
      <Select label="Where" className="w-[150px]" value={filter.where} options={options("Anywhere", entries.map((e) => e.where))} onChange={(event) => onChange({ ...filter, where: event.target.value })} />
      <Input label="Words" className="w-[160px]" value={filter.words} onChange={(event) => onChange({ ...filter, words: event.target.value })} />
      <p className="flex w-full flex-wrap items-center gap-x-4 gap-y-1 text-t2 text-ink-2" role="status">
        <span>{filtered ? `${shown} of ${entriesText(entries.length)}` : entriesText(entries.length)}, newest first</span>
        {filtered ? <><button type="button" className="min-h-6 text-green underline underline-offset-3" onClick={() => onChange(WHOLE_LOG)}>Show the whole log</button><a href={`?${filterQuery(filter)}`}>Link to this choice</a></> : null}
      </p>
    </div>
  );
}
