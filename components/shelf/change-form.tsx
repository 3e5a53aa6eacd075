"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useState } from "react";
import { type Resolver, useForm } from "react-hook-form";
import { FormDialog } from "@/components/ui/form-dialog";
import { Input } from "@/components/ui/input";
import { TextArea } from "@/components/ui/text-area";
import { useChange } from "@/components/ui/use-change";
import type { ShelfRow } from "@/lib/core/shelf";
import { send } from "@/lib/http/send";
import type { ShelfChange } from "@/lib/schemas/shelf";
import { ShelfFields } from "./shelf-fields";
import { correctForm, fieldsOf, type ShelfFields as Fields } from "./shelf-form";

interface Given {
  board: ShelfRow;
  onClose(): void;
}

function useSend(board: ShelfRow, onClose: () => void) {
  const router = useRouter();
  const { refusal, busy, attempt } = useChange();
  async function change(body: ShelfChange): Promise<void> {
    if (!(await attempt(() => send("PATCH", `/api/shelf-boards/${board.id}`, body)))) return;
    router.refresh();
    onClose();
  }
  return { refusal, busy, change };
}

function Correct({ board, onClose }: Given) {
  const { refusal, busy, change } = useSend(board, onClose);
  const { reservedFor: _kept, ...defaultValues } = fieldsOf(board);
  const { register, control, handleSubmit, setError, formState: { errors } } = useForm<Fields>({ resolver: zodResolver(correctForm) as unknown as Resolver<Fields>, defaultValues });
  const submit = handleSubmit(async ({ reason, ...after }) => {
    // what the schema made of the fields: texts or null, chips with their sizes in bytes
    const now = after as unknown as Omit<ShelfRow, "reservedFor">;
    const changes = Object.fromEntries(Object.entries(now).filter(([name, value]) => JSON.stringify(value ?? null) !== JSON.stringify(board[name as keyof ShelfRow] ?? null))) as ShelfChange["changes"];
    if (Object.keys(changes).length === 0) return setError("boardNumber", { message: "These are the values on record. Change a field first." });
    await change({ changes, reason });
  });
  return (
    <FormDialog onClose={onClose} title={`Correct ${board.number}`} description="The log keeps what was there before, what is there now and why." action="Record the correction" busy={busy} refusal={refusal} onSubmit={() => void submit()}>
      <ShelfFields register={register} control={control} errors={errors} />
      <TextArea label="Reason" hint="Goes into the log as you type it." error={errors.reason?.message} {...register("reason")} />
    </FormDialog>
  );
}

function Reserve({ board, onClose }: Given) {
  const { refusal, busy, change } = useSend(board, onClose);
  const [ref, setRef] = useState(board.reservedFor?.ref ?? "");
  return (
    <FormDialog onClose={onClose} title={`Keep ${board.number} for a case`} description="Nobody takes it for another case then." action={ref.trim() === "" && board.reservedFor ? "Take the reservation off" : "Reserve it"} busy={busy} refusal={refusal}
      reason={ref.trim() === (board.reservedFor?.ref ?? "") ? (ref.trim() ? "It is reserved for this case." : "Type a case number.") : null} onSubmit={() => void change({ changes: { reservedFor: ref.trim() || null } })}>
      <Input label="Case number" mono autoComplete="off" hint="Such as 26-0042; empty for any case" value={ref} onChange={(event) => setRef(event.target.value)} />
    </FormDialog>
  );
}

function Move({ board, onClose }: Given) {
  const { refusal, busy, change } = useSend(board, onClose);
  const [place, setPlace] = useState(board.place ?? "");
  return (
    <FormDialog onClose={onClose} title={`Where ${board.number} lies now`} action="Record the place" busy={busy} refusal={refusal} reason={place.trim() === (board.place ?? "") ? "It lies there already." : null} onSubmit={() => void change({ changes: { place: place.trim() || null } })}>
      <Input label="Place" autoComplete="off" maxLength={120} value={place} onChange={(event) => setPlace(event.target.value)} />
    </FormDialog>
  );
}

function Retire({ board, onClose }: Given) {
  const { refusal, busy, change } = useSend(board, onClose);
  const [reason, setReason] = useState("");
  const back = board.state === "retired";
  return (
    <FormDialog onClose={onClose} title={back ? `Bring ${board.number} back to the shelf` : `Retire ${board.number}`} description={back ? undefined : "It is offered for no drive any more. Its record and its photos stay."} action={back ? "Bring it back" : "Retire it"} variant={back ? "lead" : "stop"} busy={busy} refusal={refusal}
      reason={reason.trim().length < 3 ? "Write why." : null} onSubmit={() => void change({ changes: { retired: !back }, reason: reason.trim() })}>
      <TextArea label="Reason" hint="Goes into the log as you type it." maxLength={2000} value={reason} onChange={(event) => setReason(event.target.value)} />
    </FormDialog>
  );
}

export type Change = keyof typeof FORMS;

const FORMS = { correct: Correct, reserve: Reserve, move: Move, retire: Retire };

/** The form for one change of a board. */
export function ChangeForm({ change, ...given }: Given & { change: Change }) {
  const Form = FORMS[change];
  return <Form {...given} />;
}
