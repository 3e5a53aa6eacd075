"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { whenAsked } from "@/components/ui/when-asked";
import type { NoteView } from "@/lib/views";

const NoteForm = whenAsked(() => import("./note-form").then((m) => m.NoteForm));

export function AddNote({ caseId, drives, corrects = null }: { caseId: string; drives: { id: string; letter: string }[]; corrects?: NoteView | null }) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button size="small" className="self-start" onClick={() => setOpen(true)}>{corrects ? <>Correct…<span className="sr-only"> note {corrects.number}</span></> : "Add a note…"}</Button>
      {open ? <NoteForm caseId={caseId} drives={drives} corrects={corrects} onClose={() => setOpen(false)} /> : null}
    </>
  );
}
