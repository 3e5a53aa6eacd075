"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { whenAsked } from "@/components/ui/when-asked";
import type { ErasureView } from "@/lib/views";

const EraseForm = whenAsked(() => import("./erase-form").then((m) => m.EraseForm));

export function EraseImages({ view }: { view: ErasureView }) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button variant="stop" reason={view.refusal} disabled={view.refusal !== null} onClick={() => setOpen(true)}>Erase the images…</Button>
      {open ? <EraseForm view={view} onClose={() => setOpen(false)} /> : null}
    </>
  );
}
