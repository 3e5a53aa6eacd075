"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { whenAsked } from "@/components/ui/when-asked";
import type { ErasureView } from "@/lib/views";
import type { What } from "./keep-form";

const KeepForm = whenAsked(() => import("./keep-form").then((m) => m.KeepForm));

/** A later day for the images, or the end of one. */
export function KeepLonger({ view }: { view: ErasureView }) {
  const [open, setOpen] = useState<What | null>(null);
  return (
    <>
      <Button onClick={() => setOpen("keep")}>{view.kept ? "Change the later day…" : "Keep longer…"}</Button>
      {view.kept ? <Button onClick={() => setOpen("end")}>End the keeping…</Button> : null}
      {open ? <KeepForm view={view} what={open} onClose={() => setOpen(null)} /> : null}
    </>
  );
}
