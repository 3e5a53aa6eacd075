"use client";

import { useId, useRef, useState, type KeyboardEvent } from "react";
import useSWR from "swr";
import { controlClass, Field } from "@/components/ui/field";
import { Icon } from "@/components/ui/icon";
import { fetcher } from "@/lib/http/send";
import type { CaseRow, ListView } from "@/lib/views";

export interface CaseChoice {
  id: string;
  ref: string;
}

const SHOWN = 6;

/**
 * Chooses cases by number or customer: type, arrow keys, Enter. What is chosen stands below as numbers to take off again.
 * `onOpen` says whether the list of hits is open: Escape then closes that list, not what lies around it.
 */
export function CasePicker({ chosen, error, onChange, onOpen }: { chosen: readonly CaseChoice[]; error?: string; onChange(next: CaseChoice[]): void; onOpen(open: boolean): void }) {
  const [q, setQ] = useState("");
  const [open, setOpen] = useState(false);
  const [at, setAt] = useState(0);
  const [said, setSaid] = useState("");
  const input = useRef<HTMLInputElement>(null);
  const listId = useId();
  const { data, error: away, isLoading } = useSWR<ListView<CaseRow>>(open ? `/api/cases?${new URLSearchParams({ q, sort: "received", order: "desc", pageSize: String(SHOWN + chosen.length) })}` : null, fetcher, { keepPreviousData: true });
  const hits = (data?.items ?? []).filter((one) => !chosen.some((c) => c.id === one.id)).slice(0, SHOWN);
  const current = open && hits.length > 0 ? Math.min(at, hits.length - 1) : -1;

  function show(next: boolean) {
    setOpen(next);
    onOpen(next);
  }
  function add({ id, ref }: CaseChoice) {
    onChange([...chosen, { id, ref }].sort((a, b) => a.ref.localeCompare(b.ref)));
    setSaid(`${ref} is on the list.`);
    setQ("");
    setAt(0);
  }
  function takeOff({ id, ref }: CaseChoice) {
    onChange(chosen.filter((one) => one.id !== id));
    setSaid(`${ref} is off the list.`);
    input.current?.focus();
  }
  function onKeyDown(event: KeyboardEvent) {
    if (event.key === "Escape") return show(false);
    if (!["ArrowDown", "ArrowUp", "Enter"].includes(event.key)) return;
    event.preventDefault();
    if (!open) return show(true);
    if (event.key === "Enter") {
      // while the hits of what was typed before still stand there, Enter takes none of them
      if (current >= 0 && !isLoading) add(hits[current]);
      return;
    }
    setAt((current + (event.key === "ArrowDown" ? 1 : hits.length - 1)) % Math.max(1, hits.length));
  }
  return (
    <div className="grid gap-2">
      <Field label="Cases" hint="Type a number or a customer, then Enter." error={error}>
        {(control) => (
          <input
            {...control} ref={input} type="text" role="combobox" autoComplete="off" value={q} placeholder="26-0042"
            aria-expanded={open} aria-controls={listId} aria-autocomplete="list" aria-activedescendant={current >= 0 ? `${listId}-${current}` : undefined}
            onChange={(event) => { setQ(event.target.value); setAt(0); show(true); }}
            onClick={() => show(true)} onBlur={() => { show(false); setQ(""); }} onKeyDown={onKeyDown} className={controlClass(Boolean(error), false, "min-h-control")}
          />
        )}
      </Field>
      <ul id={listId} role="listbox" aria-label="Cases that fit" hidden={!open} className="-mt-1 border border-rule-2 bg-sheet">
        {hits.map((one, i) => (
          <li key={one.id} id={`${listId}-${i}`} role="option" aria-selected={i === current} onMouseDown={(event) => event.preventDefault()} onClick={() => add(one)}
            className={`grid min-h-8 cursor-pointer phone:min-h-11 grid-cols-[auto_minmax(0,1fr)] items-center gap-3 px-2.5 py-1 ${i === current ? "bg-well outline outline-2 -outline-offset-2 outline-ink-2" : "hover:bg-well"}`}>
            <span className="font-mono">{one.ref}</span><span className="truncate text-t2 text-ink-2">{one.customerName}</span>
          </li>
        ))}
        {hits.length === 0 ? <li role="option" aria-selected={false} aria-disabled="true" className="px-2.5 py-1.5 text-t2 text-ink-2">{away ? "The cases can’t be looked up just now. Check the network." : data ? (q.trim() ? `No other case fits “${q.trim()}”.` : "No other case is on record.") : "Looking."}</li> : null}
      </ul>
      {chosen.length > 0 ? (
        <ul aria-label="Cases on the list" className="flex flex-wrap gap-2">
          {chosen.map((one) => (
            <li key={one.id} className="flex items-stretch border border-rule-2 bg-sheet">
              <span className="px-2 py-1 font-mono text-t2 leading-5 phone:py-2.5">{one.ref}</span>
              <button type="button" aria-label={`Take ${one.ref} off the list`} onClick={() => takeOff(one)} className="grid w-7 cursor-pointer phone:w-11 place-items-center border-l border-rule-2 hover:bg-well"><Icon name="close" size={12} /></button>
            </li>
          ))}
        </ul>
      ) : null}
      <span role="status" className="sr-only">{said}</span>
    </div>
  );
}
