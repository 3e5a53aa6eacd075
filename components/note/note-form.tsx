"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useForm } from "react-hook-form";
import { z } from "zod";
import { FormDialog } from "@/components/ui/form-dialog";
import { Input } from "@/components/ui/input";
import { Select } from "@/components/ui/select";
import { TextArea } from "@/components/ui/text-area";
import { useChange } from "@/components/ui/use-change";
import { LATE_AFTER_HOURS } from "@/lib/core/late";
import { send } from "@/lib/http/send";
import { noteInput } from "@/lib/schemas/note";
import type { NoteView } from "@/lib/views";

/** The browser's own field for a day and a time gives it without a zone: it is this machine's. */
const form = z.object({ text: noteInput.shape.text, happenedAt: z.string(), driveId: z.string() });

export function NoteForm({ caseId, drives, corrects, onClose }: { caseId: string; drives: { id: string; letter: string }[]; corrects: NoteView | null; onClose(): void }) {
  const router = useRouter();
  const { refusal, busy, attempt } = useChange();
  const { register, handleSubmit, formState: { errors } } = useForm({ resolver: zodResolver(form), defaultValues: { text: "", happenedAt: "", driveId: "" } });
  const submit = handleSubmit(async ({ text, happenedAt, driveId }) => {
    const input = { text, driveId, happenedAt: happenedAt ? new Date(happenedAt).toISOString() : null, corrects: corrects?.id ?? null };
    if (!(await attempt(() => send("POST", `/api/cases/${caseId}/notes`, input)))) return;
    router.refresh();
    onClose();
  });
  return (
    <FormDialog onClose={onClose} title={corrects ? `Correct note ${corrects.number}` : "Add a note"} description="A note is never changed afterwards; a correction is a note of its own. No customer’s name: it goes into the custody log word for word."
      action={corrects ? "Record the correction" : "Add the note"} busy={busy} refusal={refusal} onSubmit={() => void submit()}>
      {corrects ? <blockquote className="border-l-2 border-rule-2 pl-3 text-ink-2 whitespace-pre-line">{corrects.text}</blockquote> : null}
      <TextArea label={corrects ? "What is right" : "Note"} error={errors.text?.message} {...register("text")} />
      <div className="grid grid-cols-2 gap-4 slim:grid-cols-1">
        <Input label="When it happened" type="datetime-local" hint={`Leave empty for just now. More than ${LATE_AFTER_HOURS} hours ago is marked late.`} error={errors.happenedAt?.message} {...register("happenedAt")} />
        {drives.length > 1 ? <Select label="About" options={[{ value: "", label: "The whole case" }, ...drives.map((one) => ({ value: one.id, label: `Drive ${one.letter}` }))]} {...register("driveId")} /> : null}
      </div>
    </FormDialog>
  );
}
