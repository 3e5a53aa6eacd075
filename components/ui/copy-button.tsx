"use client";

import { useState } from "react";
import { Icon } from "./icon";

/** Copies the whole text, however short it is shown. Says so to screen readers as well. */
export function CopyButton({ text, label, done }: { text: string; label: string; done: string }) {
  const [said, setSaid] = useState("");
  async function copy() {
    try {
      await navigator.clipboard.writeText(text);
      setSaid(done);
    } catch {
      // The clipboard exists on https and localhost only.
      setSaid("This browser does not allow copying here. Select the text instead.");
    }
    setTimeout(() => setSaid(""), 2000);
  }
  return (
    <span className="no-print">
      <button type="button" onClick={copy} aria-label={label} title={said || label} className={`-my-[3px] ml-px inline-grid h-6 w-6 place-items-center align-middle hover:text-green ${said ? "text-green" : "text-ink-3"}`}>
        <Icon name={said === done ? "equal" : "copy"} size={14} className="!align-baseline" />
      </button>
      <span className="sr-only" aria-live="polite">{said}</span>
    </span>
  );
}
