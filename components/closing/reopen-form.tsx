"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useForm } from "react-hook-form";
import { FormDialog } from "@/components/ui/form-dialog";
import { TextArea } from "@/components/ui/text-area";
import { useChange } from "@/components/ui/use-change";
import { send } from "@/lib/http/send";
import { type ReopeningInput, reopeningInput } from "@/lib/schemas/closing";

export function ReopenForm({ caseId, caseRef, onClose }: { caseId: string; caseRef: string; onClose(): void }) {
  const router = useRouter();
  const { refusal, busy, attempt } = useChange();
  const { register, handleSubmit, formState: { errors } } = useForm<ReopeningInput>({ resolver: zodResolver(reopeningInput), defaultValues: { reason: "" } });
  const submit = handleSubmit(async (input) => {
    if (!(await attempt(() => send("POST", `/api/cases/${caseId}/reopening`, input)))) return;
    router.refresh();
    onClose();
  });
  return (
    <FormDialog onClose={onClose} title={`Reopen case ${caseRef}`} action="Reopen the case" busy={busy} refusal={refusal} onSubmit={() => void submit()}
      description="It comes back to the bench and takes changes again. Its images are due for erasure no more until it is closed again.">
      <TextArea label="Reason" hint="Goes into the log of every drive as you type it." error={errors.reason?.message} {...register("reason")} />
    </FormDialog>
  );
}
