"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { whenAsked } from "@/components/ui/when-asked";

const ReopenForm = whenAsked(() => import("./reopen-form").then((m) => m.ReopenForm));

export function ReopenCase({ caseId, caseRef }: { caseId: string; caseRef: string }) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button onClick={() => setOpen(true)}>Reopen the case…</Button>
      {open ? <ReopenForm caseId={caseId} caseRef={caseRef} onClose={() => setOpen(false)} /> : null}
    </>
  );
}
