"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useState } from "react";
import { useForm, useWatch } from "react-hook-form";
import type { z } from "zod";
import { Button } from "@/components/ui/button";
import { FormDialog } from "@/components/ui/form-dialog";
import { Note } from "@/components/ui/note";
import { TextArea } from "@/components/ui/text-area";
import { useChange } from "@/components/ui/use-change";
import { donorFit } from "@/lib/core/donor-fit";
import type { BoardRole } from "@/lib/core/words";
import { send } from "@/lib/http/send";
import { type BoardInput, boardInput } from "@/lib/schemas/board";
import type { BoardView } from "@/lib/views";
import { BoardFields } from "./board-fields";
import { DonorFitNote } from "./donor-fit-note";

interface Given {
  driveId: string;
  role: BoardRole;
  original: BoardView | null;
  /** may take a donor with another board number */
  isLead: boolean;
}

const typed = (value: unknown) => (typeof value === "string" ? value : "");

function AddBoardForm({ driveId, role, original, isLead, onClose }: Given & { onClose(): void }) {
  const router = useRouter();
  const { refusal, busy, attempt } = useChange();
  const { register, handleSubmit, control, formState: { errors } } = useForm<z.input<typeof boardInput>, unknown, BoardInput>({ resolver: zodResolver(boardInput), defaultValues: { role, boardNumber: "", reason: "" } });
  const [boardNumber, revision, controllerMarking, motorDriverMarking] = useWatch({ control, name: ["boardNumber", "revision", "controllerMarking", "motorDriverMarking"] }).map(typed);
  const facts = { boardNumber, revision, controllerMarking, motorDriverMarking };
  const other = role === "donor" && original !== null && boardNumber.trim() !== "" && donorFit(original, facts).verdict === "other-number";
  const submit = handleSubmit(async ({ reason, ...input }) => {
    // the reason belongs to another board number only
    if (!(await attempt(() => send("POST", `/api/drives/${driveId}/boards`, other && reason ? { ...input, reason } : input)))) return;
    router.refresh();
    onClose();
  });
  return (
    <FormDialog onClose={onClose} title={role === "original" ? "Add the original board" : "Add a donor board"} action="Add the board" busy={busy} refusal={refusal}
      reason={other && !isLead ? "A lead records a donor with another board number." : null} onSubmit={() => void submit()}
      description={role === "original" ? "The customer’s board. Its chips are only ever read." : "It has to carry the original’s board number."}>
      <BoardFields register={register} errors={errors} />
      {role === "donor" && original ? <DonorFitNote original={original} donor={facts} isLead={isLead} /> : null}
      {other && isLead ? <TextArea label="Reason for taking this donor" hint="Goes into the custody log as you type it." error={errors.reason?.message} {...register("reason")} /> : null}
      <Note kind="caution" title="Strap and mat on before you touch a board.">Static discharge destroys chips without a mark.</Note>
    </FormDialog>
  );
}

export function AddBoard({ lead, ...given }: Given & { lead?: boolean }) {
  const [open, setOpen] = useState(false);
  const missing = given.role === "donor" && !given.original ? "Record the original board first." : null;
  return (
    <>
      <Button variant={lead ? "lead" : "plain"} size={lead ? "normal" : "small"} reason={missing} onClick={() => setOpen(true)}>{given.role === "original" ? "Add the original board…" : "Add a donor board…"}</Button>
      {open ? <AddBoardForm {...given} onClose={() => setOpen(false)} /> : null}
    </>
  );
}
