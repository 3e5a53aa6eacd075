"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useState } from "react";
import { useForm, useWatch } from "react-hook-form";
import type { z } from "zod";
import { Button } from "@/components/ui/button";
import { FormBody } from "@/components/ui/form-dialog";
import { Note } from "@/components/ui/note";
import { TextArea } from "@/components/ui/text-area";
import { useChange } from "@/components/ui/use-change";
import { donorFit } from "@/lib/core/donor-fit";
import type { BoardRole } from "@/lib/core/words";
import { send } from "@/lib/http/send";
import { type BoardInput, boardInput } from "@/lib/schemas/board";
import type { DriveView } from "@/lib/views";
import { BoardFields } from "./board-fields";
import { DonorFitNote } from "./donor-fit-note";
import { originalOf } from "./drive-words";
import { goOnWords } from "./flow";
import type { StepGiven } from "./flow-given";
import { keepUsed, lastUsed } from "./last-used";

const typed = (value: unknown) => (typeof value === "string" ? value : "");

/** A board. A donor's number is typed from the donor, never taken over from the original: comparing them is the point. */
export function BoardStep({ drive, role, isLead, proposed = {}, userId, onClose, onSaved }: StepGiven & {
  drive: DriveView;
  role: BoardRole;
  /** may take a donor with another board number */
  isLead: boolean;
  proposed?: { boardNumber?: string; revision?: string };
  onSaved(goOn: boolean): Promise<void>;
}) {
  const { refusal, busy, attempt } = useChange();
  const [used] = useState(() => lastUsed(userId));
  const original = originalOf(drive);
  const { register, handleSubmit, control, formState: { errors } } = useForm<z.input<typeof boardInput>, unknown, BoardInput>({
    resolver: zodResolver(boardInput),
    defaultValues: { role, boardNumber: "", revision: "", reason: "", dataInController: false, ...(role === "original" ? proposed : {}) },
  });
  const values = useWatch({ control, name: ["boardNumber", "revision", "controllerMarking", "motorDriverMarking"] }).map(typed);
  const dataInController = useWatch({ control, name: "dataInController" }) === true;
  const [boardNumber, revision, controllerMarking, motorDriverMarking] = values;
  const facts = { boardNumber, revision, controllerMarking, motorDriverMarking };
  const other = role === "donor" && original !== null && boardNumber.trim() !== "" && donorFit(original, facts).verdict === "other-number";
  const goOn = goOnWords({ kind: "board", role }, drive, { dataInController });
  const reason = other && !isLead ? "A lead records a donor with another board number." : null;
  const save = (on: boolean) => handleSubmit((input) => attempt(async () => {
    const { reason: why, dataInController: inside, ...rest } = input;
    // the reason belongs to another board number only, and the tick to an original
    await send("POST", `/api/drives/${drive.id}/boards`, { ...rest, ...(role === "original" ? { dataInController: inside } : {}), ...(other && why ? { reason: why } : {}) });
    keepUsed(userId, input);
    await onSaved(on);
  }).then(() => undefined))();
  return (
    <FormBody onClose={onClose} action={goOn ?? "Add the board"} busy={busy} refusal={refusal} reason={reason} onSubmit={() => void save(goOn !== null)}
      also={goOn ? <Button disabled={busy || reason !== null} onClick={() => void save(false)}>Add the board</Button> : null}>
      <BoardFields role={role} register={register} errors={errors} dataInController={dataInController} used={used} />
      {role === "donor" && original ? <DonorFitNote original={original} donor={facts} isLead={isLead} /> : null}
      {other && isLead ? <TextArea label="Reason for taking this donor" hint="Goes into the custody log as you type it." error={errors.reason?.message} {...register("reason")} /> : null}
      <Note kind="caution" title="Strap and mat on before you touch a board.">Static discharge destroys chips without a mark.</Note>
    </FormBody>
  );
}
