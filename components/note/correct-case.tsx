"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { whenAsked } from "@/components/ui/when-asked";
import type { CaseView } from "@/lib/views";

const CorrectCaseForm = whenAsked(() => import("./correct-case-form").then((m) => m.CorrectCaseForm));

export function CorrectCase({ view, neededBy }: { view: CaseView; /** as the request says */ neededBy: string | null }) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button size="small" onClick={() => setOpen(true)}>Correct the case…</Button>
      {open ? <CorrectCaseForm view={view} neededBy={neededBy} onClose={() => setOpen(false)} /> : null}
    </>
  );
}
