"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { whenAsked } from "@/components/ui/when-asked";
import type { Given } from "./place-chips-form";

const PlaceChipsForm = whenAsked(() => import("./place-chips-form").then((m) => m.PlaceChipsForm));

export function PlaceChips(given: Given) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button size="small" onClick={() => setOpen(true)}>Place the chips…</Button>
      {open ? <PlaceChipsForm {...given} onClose={() => setOpen(false)} /> : null}
    </>
  );
}
