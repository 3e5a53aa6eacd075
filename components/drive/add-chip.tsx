"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { whenAsked } from "@/components/ui/when-asked";
import type { BoardView, DriveView } from "@/lib/views";

const RecordFlow = whenAsked(() => import("./record-flow").then((m) => m.RecordFlow));

export function AddChip({ drive, board, isLead, userId, lead }: { drive: DriveView; board: BoardView; isLead: boolean; userId: string; lead?: boolean }) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button variant={lead ? "lead" : "plain"} size={lead ? "normal" : "small"} onClick={() => setOpen(true)}>Add a chip…</Button>
      {open ? <RecordFlow start={{ kind: "chip", boardId: board.id }} drive={drive} caseId={drive.caseId} userId={userId} isLead={isLead} onClose={() => setOpen(false)} /> : null}
    </>
  );
}
