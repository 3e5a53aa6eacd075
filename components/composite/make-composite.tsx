"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { whenAsked } from "@/components/ui/when-asked";
import type { ChipView } from "@/lib/views";

const MakeCompositeForm = whenAsked(() => import("./make-composite-form").then((m) => m.MakeCompositeForm));

/** For a lead, where reads disagree and at least three are there. */
export function MakeComposite(given: { chip: ChipView; onChanged(): Promise<unknown> }) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button onClick={() => setOpen(true)}>Make a composite…</Button>
      {open ? <MakeCompositeForm {...given} onClose={() => setOpen(false)} /> : null}
    </>
  );
}
