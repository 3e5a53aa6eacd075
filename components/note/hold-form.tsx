"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useForm, useWatch } from "react-hook-form";
import { FormDialog } from "@/components/ui/form-dialog";
import { Input } from "@/components/ui/input";
import { Select } from "@/components/ui/select";
import { TextArea } from "@/components/ui/text-area";
import { useChange } from "@/components/ui/use-change";
import { WAITING_FOR } from "@/lib/core/words";
import { send } from "@/lib/http/send";
import { type HoldInput, holdInput, resumeInput } from "@/lib/schemas/note";
import type { HoldView } from "@/lib/views";
import { WAITING_WORDS } from "./note-words";

const OPTIONS = WAITING_FOR.map((value) => ({ value, label: WAITING_WORDS[value] }));

export function HoldForm({ caseId, hold, onClose }: { caseId: string; hold: HoldView | null; onClose(): void }) {
  const router = useRouter();
  const { refusal, busy, attempt } = useChange();
  const { register, handleSubmit, control, formState: { errors } } = useForm<HoldInput>({ resolver: zodResolver(holdInput), defaultValues: { waitingFor: hold?.waitingFor ?? "customer", reason: hold?.reason ?? "" } });
  const waitingFor = useWatch({ control, name: "waitingFor" });
  const submit = handleSubmit(async (input) => {
    if (!(await attempt(() => send("POST", `/api/cases/${caseId}/hold`, input)))) return;
    router.refresh();
    onClose();
  });
  return (
    <FormDialog onClose={onClose} title={hold ? "Change what it waits for" : "Put the case on hold"} description="The bench shows it with whom it waits for and since when." action={hold ? "Record the change" : "Put on hold"} busy={busy} refusal={refusal} onSubmit={() => void submit()}>
      <Select label="Waiting for" options={OPTIONS} error={errors.waitingFor?.message} {...register("waitingFor")} />
      <TextArea label={waitingFor === "customer" ? "The question to the customer" : "Reason"} hint={waitingFor === "customer" ? "The customer reads it on their page, word for word." : "Goes into the custody log as you type it."} error={errors.reason?.message} {...register("reason")} />
    </FormDialog>
  );
}

export function ResumeForm({ caseId, onClose }: { caseId: string; onClose(): void }) {
  const router = useRouter();
  const { refusal, busy, attempt } = useChange();
  const { register, handleSubmit, formState: { errors } } = useForm({ resolver: zodResolver(resumeInput), defaultValues: { reason: "" } });
  const submit = handleSubmit(async (input) => {
    if (!(await attempt(() => send("POST", `/api/cases/${caseId}/resumption`, input)))) return;
    router.refresh();
    onClose();
  });
  return (
    <FormDialog onClose={onClose} title="Go on with the case" action="Go on" busy={busy} refusal={refusal} onSubmit={() => void submit()}>
      <Input label="What came of it" hint="The answer, for one. Goes into the custody log." error={errors.reason?.message} {...register("reason")} />
    </FormDialog>
  );
}
