import { Input } from "@/components/ui/input";
import { Select } from "@/components/ui/select";
import type { CustodyEntryView } from "@/lib/views";
import { LOG_KINDS, type LogFilter, ofKind } from "./log-words";

const distinct = (values: string[]) => [...new Set(values.filter(Boolean))].sort();

/** What of the log is shown: kind, who, where, words. */
export function LogFilterBar({ entries, filter, onChange }: { entries: readonly CustodyEntryView[]; filter: LogFilter; onChange(filter: LogFilter): void }) {
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
      <Select label="Who" className="w-[170px]" value={filter.who} options={options("Anyone", entries.map((e) => e.actor.name))} onChange={(event) => onChange({ ...filter, who: event.target.value })} />
      <Select label="Where" className="w-[170px]" value={filter.where} options={options("Anywhere", entries.map((e) => e.where))} onChange={(event) => onChange({ ...filter, where: event.target.value })} />
      <Input label="Words" className="w-[200px]" value={filter.words} onChange={(event) => onChange({ ...filter, words: event.target.value })} />
      <span className="ml-auto pb-2 text-ink-2">newest first</span>
    </div>
  );
}
