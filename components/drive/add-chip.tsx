"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import type { BoardView, DriveView } from "@/lib/views";
import { RecordFlow } from "./record-flow";

export function AddChip({ drive, board, isLead, userId, lead }: { drive: DriveView; board: BoardView; isLead: boolean; userId: string; lead?: boolean }) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button variant={lead ? "lead" : "plain"} size={lead ? "normal" : "small"} onClick={() => setOpen(true)}>Add a chip…</Button>
      {open ? <RecordFlow start={{ kind: "chip", boardId: board.id }} drive={drive} caseId={drive.caseId} userId={userId} isLead={isLead} onClose={() => setOpen(false)} /> : null}
    </>
  );
}
