"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { whenAsked } from "@/components/ui/when-asked";
import type { Given } from "./correct-board-form";

const CorrectBoardForm = whenAsked(() => import("./correct-board-form").then((m) => m.CorrectBoardForm));

export function CorrectBoard(given: Given) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button size="small" onClick={() => setOpen(true)}>Correct board…</Button>
      {open ? <CorrectBoardForm {...given} onClose={() => setOpen(false)} /> : null}
    </>
  );
}
