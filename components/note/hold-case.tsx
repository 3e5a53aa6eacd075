"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { whenAsked } from "@/components/ui/when-asked";
import type { HoldView } from "@/lib/views";

const HoldForm = whenAsked(() => import("./hold-form").then((m) => m.HoldForm));
const ResumeForm = whenAsked(() => import("./hold-form").then((m) => m.ResumeForm));

export function HoldCase({ caseId, hold }: { caseId: string; hold: HoldView | null }) {
  const [open, setOpen] = useState<"hold" | "resume" | null>(null);
  const close = () => setOpen(null);
  return (
    <>
      {hold ? <Button size="small" onClick={() => setOpen("resume")}>Go on with the case…</Button> : null}
      <Button size="small" onClick={() => setOpen("hold")}>{hold ? "Change what it waits for…" : "Put on hold…"}</Button>
      {open === "hold" ? <HoldForm caseId={caseId} hold={hold} onClose={close} /> : null}
      {open === "resume" ? <ResumeForm caseId={caseId} onClose={close} /> : null}
    </>
  );
}
