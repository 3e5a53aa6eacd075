"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { whenAsked } from "@/components/ui/when-asked";
import type { ClosingView } from "@/lib/views";

const ReturnForm = whenAsked(() => import("./return-form").then((m) => m.ReturnForm));

export function RecordReturn({ caseId, closing, lead }: { caseId: string; closing: ClosingView; lead: boolean }) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button variant={lead ? "lead" : "plain"} onClick={() => setOpen(true)}>Record the return…</Button>
      {open ? <ReturnForm caseId={caseId} closing={closing} onClose={() => setOpen(false)} /> : null}
    </>
  );
}
