"use client";

import type { Ref } from "react";
import { Mark } from "@/components/ui/mark";
import { type Errors, openFields } from "./draft";
import { fieldId } from "./form-parts";

/** What keeps the request from being sent, each with a way to its field. It takes the focus when it appears. */
export function ErrorSummary({ ref, errors, sentence, shown }: { ref: Ref<HTMLDivElement>; errors: Errors; sentence: string | null; shown: boolean }) {
  const open = openFields(errors);
  return (
    <div ref={ref} tabIndex={-1} role="group" aria-label="What is open" className={shown ? "mt-5 grid grid-cols-[16px_minmax(0,1fr)] gap-2.5 bg-block-wash px-3 py-2.5 ring-1 ring-block ring-inset [--hole:var(--block-wash)]" : "sr-only"}>
      {shown ? (
        <>
          <Mark kind="block" className="mt-0.5" />
          <div>
            <b className="block">{sentence ? "The request was not sent." : open.length === 1 ? "One thing is open." : `${open.length} things are open.`}</b>
            {sentence && open.every((name) => errors[name] !== sentence) ? <p>{sentence}</p> : null}
            {open.length > 0 ? (
              <ul className="grid gap-1 pt-1">
                {open.map((name) => (
                  <li key={name}><a href={`#${fieldId(name)}`} onClick={(event) => { event.preventDefault(); document.getElementById(fieldId(name))?.focus(); }}>{errors[name]}</a></li>
                ))}
              </ul>
            ) : null}
          </div>
        </>
      ) : null}
    </div>
  );
}
