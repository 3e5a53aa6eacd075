"use client";

import { type ReactNode, type Ref, useState } from "react";
import { Button } from "@/components/ui/button";
import { Checkbox } from "@/components/ui/checkbox";
import { controlClass } from "@/components/ui/field";
import { Icon } from "@/components/ui/icon";
import { withCommas } from "@/lib/core/quantity";
import { address } from "@/lib/core/strip";
import { parseAddress } from "./places";

/** Next and previous difference, go to an address, folding, layout and the keys' switch. */
export function CompareBar({ current, total, at, sizeBytes, fold, under, keys, field, onStep, onGo, onFold, onUnder, onKeys, children }: {
  /** index of the current range, -1 before the first */
  current: number;
  total: number;
  at: number;
  sizeBytes: number;
  fold: boolean;
  under: boolean;
  keys: boolean;
  field: Ref<HTMLInputElement>;
  onStep(step: 1 | -1): void;
  onGo(at: number): void;
  onFold(on: boolean): void;
  onUnder(on: boolean): void;
  onKeys(on: boolean): void;
  /** further rows of controls */
  children: ReactNode;
}) {
  const [wrong, setWrong] = useState<string | null>(null);
  const shown = address(at, sizeBytes);
  // the field says where one is, until another address is typed
  const [typed, setTyped] = useState({ at, text: shown });
  function go(form: HTMLFormElement) {
    const typed = parseAddress(String(new FormData(form).get("go") ?? ""));
    if (typed === null) setWrong("Type an address such as 0x1F03A, or a byte count such as 126976.");
    else if (typed >= sizeBytes) setWrong(`The last address is ${address(sizeBytes - 1, sizeBytes)}.`);
    else {
      setWrong(null);
      onGo(typed);
    }
  }
  return (
    <div className="no-print mt-3.5 border-t border-b border-t-rule border-b-rule-2 py-2.5">
      <div className="flex flex-wrap items-center gap-x-3.5 gap-y-2">
        {total > 0 ? (
          <>
            <Button onClick={() => onStep(-1)}><Icon name="prev" />Previous <kbd className="key">P</kbd></Button>
            <Button onClick={() => onStep(1)}>Next difference <kbd className="key">N</kbd><Icon name="next" /></Button>
            <span className="tabular-nums"><b>{current < 0 ? "0" : withCommas(current + 1)}</b> of {withCommas(total)}</span>
          </>
        ) : null}
        <form className="flex items-center gap-2" onSubmit={(event) => { event.preventDefault(); go(event.currentTarget); }}>
          <label htmlFor="go" className="text-t2">Go to</label>
          <input ref={field} id="go" name="go" value={typed.at === at ? typed.text : shown} onChange={(event) => setTyped({ at, text: event.target.value })} autoComplete="off" spellCheck={false} aria-invalid={wrong ? true : undefined} aria-describedby={wrong ? "go-wrong" : undefined} className={controlClass(Boolean(wrong), true, "!w-[128px] min-h-control")} />
          <Button type="submit">Go</Button>
        </form>
        <Checkbox label="Fold lines that agree" checked={fold} onChange={(event) => onFold(event.target.checked)} />
        <Checkbox label="Reads under each other" className="phone:hidden" checked={under} onChange={(event) => onUnder(event.target.checked)} />
        <Checkbox label="Keys of one letter" checked={keys} onChange={(event) => onKeys(event.target.checked)} />
      </div>
      {wrong ? <p id="go-wrong" role="alert" className="pt-1 text-t2 font-medium text-block">{wrong}</p> : null}
      {children}
    </div>
  );
}
