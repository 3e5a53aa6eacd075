"use client";

import Link from "next/link";
import { Button } from "@/components/ui/button";
import { Icon } from "@/components/ui/icon";

export interface PaperChoice {
  label: string;
  href: string;
  chosen: boolean;
}

/** Above the sheets, on the screen only: which paper, and the printer. */
export function PrintBar({ choices = [], hint }: { choices?: readonly PaperChoice[]; hint: string }) {
  return (
    <div className="no-print flex flex-wrap items-center gap-x-5 gap-y-2 border-y border-rule py-3">
      <Button variant="lead" onClick={() => window.print()}><Icon name="print" />Print</Button>
      {choices.length > 0 ? (
        <nav aria-label="Paper" className="flex flex-wrap items-center gap-x-3 gap-y-1">
          {choices.map((choice) => choice.chosen ? <b key={choice.href} aria-current="true">{choice.label}</b> : <Link key={choice.href} href={choice.href} className="py-1">{choice.label}</Link>)}
        </nav>
      ) : null}
      <span className="text-t2 text-ink-2">{hint}</span>
    </div>
  );
}
