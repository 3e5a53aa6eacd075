"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useForm } from "react-hook-form";
import type { z } from "zod";
import { FormDialog } from "@/components/ui/form-dialog";
import { Input } from "@/components/ui/input";
import { TextArea } from "@/components/ui/text-area";
import { useChange } from "@/components/ui/use-change";
import { longDay } from "@/lib/core/erasure";
import { send } from "@/lib/http/send";
import { type KeepingInput, keepingInput } from "@/lib/schemas/erasure";
import type { ErasureView } from "@/lib/views";

export type What = "keep" | "end";

export function KeepForm({ view, what, onClose }: { view: ErasureView; what: What; onClose(): void }) {
  const router = useRouter();
  const { refusal, busy, attempt } = useChange();
  const { register, handleSubmit, setError, formState: { errors } } = useForm<z.input<typeof keepingInput>, unknown, KeepingInput>({ resolver: zodResolver(keepingInput), defaultValues: { until: what === "keep" ? view.kept?.until ?? "" : "", reason: "" } });
  const submit = handleSubmit(async ({ until, reason }) => {
    if (what === "keep" && until === null) return setError("until", { message: "Give the day until which they are kept." });
    if (!(await attempt(() => send("POST", `/api/cases/${view.caseId}/keeping`, { until: what === "keep" ? until : null, reason })))) return;
    router.refresh();
    onClose();
  });
  const due = view.eraseOn ? longDay(view.eraseOn) : "its day";
  return (
    <FormDialog onClose={onClose} title={what === "keep" ? `Keep the images of case ${view.caseRef} longer` : `End the keeping of case ${view.caseRef}`} action={what === "keep" ? "Keep them longer" : "End the keeping"} busy={busy} refusal={refusal} onSubmit={() => void submit()}
      description={what === "keep" ? `They are due on ${due}. Until the later day nobody can erase them, also when the customer asks; a claim or an open question is a reason.` : `They are then due on ${due} again.`}>
      {what === "keep" ? <Input label="Until" type="date" min={view.eraseOn ?? undefined} className="max-w-[220px]" error={errors.until?.message} {...register("until")} /> : null}
      <TextArea label="Reason" hint="Goes into the log of every drive as you type it. Write no customer’s name." rows={3} error={errors.reason?.message} {...register("reason")} />
    </FormDialog>
  );
}
