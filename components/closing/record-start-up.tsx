"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { whenAsked } from "@/components/ui/when-asked";

const StartUpForm = whenAsked(() => import("./start-up-form").then((m) => m.StartUpForm));

export function RecordStartUp({ driveId, label, reason, lead }: { driveId: string; label: string | null; reason: string | null; lead: boolean }) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button variant={lead ? "lead" : "plain"} reason={reason} onClick={() => setOpen(true)}>Record a start-up test…</Button>
      {open ? <StartUpForm driveId={driveId} label={label} onClose={() => setOpen(false)} /> : null}
    </>
  );
}
