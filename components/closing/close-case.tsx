"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { whenAsked } from "@/components/ui/when-asked";
import type { ClosingView } from "@/lib/views";

const CloseForm = whenAsked(() => import("./close-form").then((m) => m.CloseForm));

export function CloseCase({ caseId, caseRef, closing, lead }: { caseId: string; caseRef: string; closing: ClosingView; lead: boolean }) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button variant={lead ? "lead" : "plain"} onClick={() => setOpen(true)}>Close the case…</Button>
      {open ? <CloseForm caseId={caseId} caseRef={caseRef} closing={closing} onClose={() => setOpen(false)} /> : null}
    </>
  );
}
