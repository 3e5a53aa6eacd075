"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { Mark } from "@/components/ui/mark";
import { momentText } from "@/components/ui/times";
import { whenAsked } from "@/components/ui/when-asked";
import type { HandOverView, ItemView, PersonView } from "@/lib/views";
import { handOverSteps, itemTitle, itemWords, waitsWords } from "./item-words";

const ConfirmForm = whenAsked(() => import("./confirm-form").then((m) => m.ConfirmForm));
const HandOverForm = whenAsked(() => import("./hand-over-form").then((m) => m.HandOverForm));

type Open = { kind: "hand-over"; item: ItemView } | { kind: "confirm" | "deny"; item: ItemView; handOver: HandOverView } | null;

/** Where each item of a drive is, and what can be done about it. */
export function ItemsTable({ driveId, items, user, receivers, acts, open: begins, timeZone }: {
  driveId: string;
  items: ItemView[];
  user: { id: string; name: string; role: string };
  receivers: PersonView[];
  acts: boolean;
  /** the case is open: on a closed one a hand-over ends, and none begins */
  open: boolean;
  timeZone: string;
}) {
  const [open, setOpen] = useState<Open>(null);
  const close = () => setOpen(null);
  return (
    <>
      <table className="ruled lines">
        <caption className="sr-only">Where each item is</caption>
        <thead><tr><th scope="col">Item</th><th scope="col">Where it is</th><th scope="col">Condition</th><th scope="col">Seal</th><th scope="col">Since</th>{acts ? <th scope="col"><span className="sr-only">Steps</span></th> : null}</tr></thead>
        <tbody>
          {items.map((item) => (
            <tr key={item.id}>
              <th scope="row" className={`min-w-[40ch] !whitespace-normal [overflow-wrap:anywhere] phone:min-w-0 print:min-w-0 ${item.type === "chip" ? "!pl-5 phone:!pl-0" : ""}`}>{itemTitle(item.name)}</th>
              <td className="l-full">
                {itemWords(item)}
                {item.open ? <span className="flex items-start gap-1.5 text-t2 text-ink-2"><Mark kind="run" />{waitsWords(item.open)}</span> : null}
              </td>
              <td data-l="Condition" className="[overflow-wrap:anywhere]">{(item.open ?? item.at)?.condition ?? <span className="text-ink-3">as recorded</span>}</td>
              <td data-l="Seal" className="min-w-[10ch] font-mono">{(item.open ?? item.at)?.sealNumber ?? <span className="font-face text-ink-3">none</span>}</td>
              <td data-l={item.at ? "Since" : undefined} className="whitespace-nowrap">{item.at ? momentText(item.at.confirmed!.at, timeZone) : ""}</td>
              {acts ? <td className="l-row text-right whitespace-nowrap phone:text-left"><Steps item={item} user={user} begins={begins} onOpen={setOpen} /></td> : null}
            </tr>
          ))}
        </tbody>
      </table>
      {open?.kind === "hand-over" ? <HandOverForm driveId={driveId} item={open.item} user={user} receivers={receivers} onClose={close} /> : null}
      {open && open.kind !== "hand-over" ? <ConfirmForm item={open.item.name} handOver={open.handOver} received={open.kind === "confirm"} onClose={close} /> : null}
    </>
  );
}

function Steps({ item, user, begins, onOpen }: { item: ItemView; user: { id: string; role: string }; begins: boolean; onOpen(open: Open): void }) {
  if (!item.open && !begins) return null;
  if (!item.open) return <Button size="small" onClick={() => onOpen({ kind: "hand-over", item })}>Hand over…</Button>;
  const handOver = item.open;
  const { confirms, denies } = handOverSteps(handOver, user);
  return (
    <span className="inline-flex gap-2 phone:flex phone:flex-wrap">
      {confirms ? <Button size="small" onClick={() => onOpen({ kind: "confirm", item, handOver })}>Confirm…</Button> : null}
      {denies ? <Button size="small" onClick={() => onOpen({ kind: "deny", item, handOver })}>Did not arrive…</Button> : null}
    </span>
  );
}
