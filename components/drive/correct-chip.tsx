"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { whenAsked } from "@/components/ui/when-asked";
import type { Given } from "./correct-chip-form";

const CorrectChipForm = whenAsked(() => import("./correct-chip-form").then((m) => m.CorrectChipForm));

export function CorrectChip(given: Given) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button size="small" variant="text" aria-label={`Correct ${given.chip.designator}, ${given.chip.boardRole}`} onClick={() => setOpen(true)}>Correct…</Button>
      {open ? <CorrectChipForm {...given} onClose={() => setOpen(false)} /> : null}
    </>
  );
}
