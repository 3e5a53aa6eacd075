"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { whenAsked } from "@/components/ui/when-asked";
import type { DriveProposal } from "./drive-step";

const RecordFlow = whenAsked(() => import("./record-flow").then((m) => m.RecordFlow));

/** Opens the way from the label to the donor's chip; `opened` when the page was called for it. */
export function AddDrive({ caseId, userId, isLead, lead, opened = false, proposed }: {
  caseId: string;
  userId: string;
  isLead: boolean;
  lead?: boolean;
  opened?: boolean;
  proposed?: DriveProposal & { boardNumber?: string; revision?: string };
}) {
  const [open, setOpen] = useState(opened);
  return (
    <>
      <Button variant={lead ? "lead" : "plain"} onClick={() => setOpen(true)}>Add a drive…</Button>
      {open ? <RecordFlow start={{ kind: "drive" }} drive={null} caseId={caseId} userId={userId} isLead={isLead} proposed={proposed} onClose={() => setOpen(false)} /> : null}
    </>
  );
}
