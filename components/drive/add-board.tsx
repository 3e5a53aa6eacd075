"use client";

import Link from "next/link";
import { useState } from "react";
import { Button } from "@/components/ui/button";
import { whenAsked } from "@/components/ui/when-asked";
import type { BoardRole } from "@/lib/core/words";
import type { DriveView } from "@/lib/views";
import { originalOf } from "./drive-words";

const RecordFlow = whenAsked(() => import("./record-flow").then((m) => m.RecordFlow));

export function AddBoard({ drive, role, isLead, userId, lead }: {
  drive: DriveView;
  role: BoardRole;
  /** may take a donor with another board number */
  isLead: boolean;
  userId: string;
  lead?: boolean;
}) {
  const [open, setOpen] = useState(false);
  const missing = role === "donor" && !originalOf(drive) ? "Record the original board first." : null;
  return (
    <span className="inline-flex flex-wrap items-center gap-x-4 gap-y-1">
      <Button variant={lead ? "lead" : "plain"} size={lead ? "normal" : "small"} reason={missing} onClick={() => setOpen(true)}>{role === "original" ? "Add the original board…" : "Add a donor board…"}</Button>
      {role === "donor" && !missing ? <Link href={`/drives/${drive.id}#shelf`}>Take one from the shelf</Link> : null}
      {open ? <RecordFlow start={{ kind: "board", role }} drive={drive} caseId={drive.caseId} userId={userId} isLead={isLead} onClose={() => setOpen(false)} /> : null}
    </span>
  );
}
