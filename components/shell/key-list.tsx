"use client";

import Link from "next/link";
import { useRouter } from "next/navigation";
import type { KeyboardEvent } from "react";
import { Checkbox } from "@/components/ui/checkbox";
import { Dialog } from "@/components/ui/dialog";
import { useLetterKeysOn } from "@/components/ui/letter-keys";
import type { Tab } from "./tabs";

const KEYS: readonly (readonly [where: string, keys: readonly (readonly [names: readonly string[], what: string])[]])[] = [
  ["Everywhere", [[["/"], "to the field that finds cases, serials and digests"], [["?"], "this list"], [["Tab"], "to the next link, button or field"]]],
  ["In an image strip", [
    [["←", "→"], "one cell back or on"], [["Page Up", "Page Down"], "sixteen cells"], [["Home", "End"], "first and last cell"], [["N", "P"], "next and previous difference"], [["Enter"], "opens the bytes of the cell"],
  ]],
  ["On the compare page", [[["N", "P"], "next and previous range that differs"], [["G"], "to the field for an address"]]],
  ["At a photo", [[["←", "→"], "the photo before or after"]]],
  ["While a chip is placed on its board", [[["←", "→", "↑", "↓"], "move it; with Shift in larger steps"]]],
];

/** Every key and every page. In it a digit opens the page beside it. */
export function KeyList({ pages, onClose }: { pages: readonly Tab[]; onClose(): void }) {
  const router = useRouter();
  const [on, setOn] = useLetterKeysOn();
  function go(event: KeyboardEvent) {
    const page = event.ctrlKey || event.metaKey || event.altKey ? undefined : pages[Number(event.key) - 1];
    if (!page) return;
    event.preventDefault();
    onClose();
    router.push(page.href);
  }
  return (
    <Dialog open onOpenChange={onClose} title="Keys and pages" description="While this list is open, a digit opens its page.">
      <div className="grid gap-4" onKeyDown={go}>
        <Checkbox label="Keys of one character act outside fields. Switch them off if you speak to the browser." checked={on} onChange={(event) => setOn(event.target.checked)} />
        <ol className="grid grid-cols-2 gap-x-6 gap-y-1">
          {pages.map((page, i) => <li key={page.key} className="flex gap-2.5"><kbd className="key">{i + 1}</kbd><Link href={page.href} onClick={() => onClose()}>{page.label}</Link></li>)}
        </ol>
        {KEYS.map(([where, keys]) => (
          <section key={where} className="grid gap-1">
            <h3 className="font-bold">{where}</h3>
            <dl className="grid grid-cols-[152px_minmax(0,1fr)] gap-x-3 gap-y-1">
              {keys.map(([names, what]) => (
                <div key={what} className="contents"><dt className="flex flex-wrap items-start gap-1">{names.map((name) => <kbd key={name} className="key">{name}</kbd>)}</dt><dd>{what}</dd></div>
              ))}
            </dl>
          </section>
        ))}
      </div>
    </Dialog>
  );
}
