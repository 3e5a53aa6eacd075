"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { whenAsked } from "@/components/ui/when-asked";
import type { DriveView } from "@/lib/views";

const CorrectDriveForm = whenAsked(() => import("./correct-drive-form").then((m) => m.CorrectDriveForm));

export function CorrectDrive({ drive }: { drive: DriveView }) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button size="small" onClick={() => setOpen(true)}>Correct drive…</Button>
      {open ? <CorrectDriveForm drive={drive} onClose={() => setOpen(false)} /> : null}
    </>
  );
}
