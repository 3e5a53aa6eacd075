"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { whenAsked } from "@/components/ui/when-asked";

const AddForm = whenAsked(() => import("./add-shelf-board-form").then((m) => m.AddForm));

export function AddShelfBoard() {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button variant="lead" onClick={() => setOpen(true)}>Put a board on the shelf…</Button>
      {open ? <AddForm onClose={() => setOpen(false)} /> : null}
    </>
  );
}
