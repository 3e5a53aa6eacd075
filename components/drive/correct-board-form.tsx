"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useForm, useWatch } from "react-hook-form";
import { z } from "zod";
import { FormDialog } from "@/components/ui/form-dialog";
import { TextArea } from "@/components/ui/text-area";
import { useChange } from "@/components/ui/use-change";
import { send } from "@/lib/http/send";
import { boardCorrection } from "@/lib/schemas/board";
import type { BoardView } from "@/lib/views";
import { BoardFields } from "./board-fields";
import { changedFields } from "./changed-fields";
import { DonorFitNote } from "./donor-fit-note";
import { boardName } from "@/lib/core/board-name";

const form = z.strictObject({ ...boardCorrection.shape.changes.shape, reason: boardCorrection.shape.reason });
const typed = (value: unknown) => (typeof value === "string" ? value : "");

export interface Given {
  board: BoardView;
  original: BoardView | null;
  isLead: boolean;
}

export function CorrectBoardForm({ board, original, isLead, onClose }: Given & { onClose(): void }) {
  const router = useRouter();
  const { refusal, busy, attempt } = useChange();
  const before = { boardNumber: board.boardNumber, revision: board.revision, controllerMarking: board.controllerMarking, motorDriverMarking: board.motorDriverMarking, condition: board.condition, dataInController: board.dataInController };
  const { register, handleSubmit, setError, control, formState: { errors } } = useForm<z.input<typeof form>, unknown, z.output<typeof form>>({ resolver: zodResolver(form), defaultValues: { ...before, reason: "" } });
  const [boardNumber, revision, controllerMarking, motorDriverMarking] = useWatch({ control, name: ["boardNumber", "revision", "controllerMarking", "motorDriverMarking"] }).map(typed);
  const dataInController = useWatch({ control, name: "dataInController" }) === true;
  const submit = handleSubmit(async ({ reason, ...after }) => {
    const changes = changedFields(before, after);
    if (Object.keys(changes).length === 0) return setError("boardNumber", { message: "These are the values on record. Change a field first." });
    if (!(await attempt(() => send("PATCH", `/api/boards/${board.id}`, { changes, reason })))) return;
    router.refresh();
    onClose();
  });
  return (
    <FormDialog onClose={onClose} title={`Correct ${boardName(board)}`} description="The log keeps what was there before, what is there now and why." action="Record the correction" busy={busy} refusal={refusal} onSubmit={() => void submit()}>
      <BoardFields role={board.role} register={register} errors={errors} dataInController={dataInController} />
      {board.role === "donor" && original ? <DonorFitNote original={original} donor={{ boardNumber, revision, controllerMarking, motorDriverMarking }} isLead={isLead} /> : null}
      <TextArea label="Reason" hint="Goes into the custody log as you type it." error={errors.reason?.message} {...register("reason")} />
    </FormDialog>
  );
}
