"use client";

import { useState } from "react";
import { Button, Buttons } from "@/components/ui/button";
import { whenAsked } from "@/components/ui/when-asked";
import type { ShelfRow } from "@/lib/core/shelf";
import type { Change } from "./change-form";

const ChangeForm = whenAsked(() => import("./change-form").then((m) => m.ChangeForm));

/** What can be done with a board that no drive has taken. */
export function ChangeBoard({ board }: { board: ShelfRow }) {
  const [open, setOpen] = useState<Change | null>(null);
  return (
    <>
      <Buttons>
        {board.state === "retired" ? <Button onClick={() => setOpen("retire")}>Bring it back…</Button> : (
          <>
            <Button onClick={() => setOpen("reserve")}>{board.reservedFor ? "Change the reservation…" : "Reserve it for a case…"}</Button>
            <Button onClick={() => setOpen("move")}>Move it…</Button>
            <Button onClick={() => setOpen("correct")}>Correct…</Button>
            <Button variant="stop" onClick={() => setOpen("retire")}>Retire it…</Button>
          </>
        )}
      </Buttons>
      {open ? <ChangeForm board={board} change={open} onClose={() => setOpen(null)} /> : null}
    </>
  );
}
