"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useForm } from "react-hook-form";
import type { z } from "zod";
import { Button, Buttons } from "@/components/ui/button";
import { Note } from "@/components/ui/note";
import { TextArea } from "@/components/ui/text-area";
import { useSay } from "@/components/ui/toast";
import { useChange } from "@/components/ui/use-change";
import { send } from "@/lib/http/send";
import { assessmentInput } from "@/lib/schemas/policy";

/** An auditor says what to think of a log that does not check out; work on the drive opens again after it. */
export function AssessmentForm({ driveId, onDone }: { driveId: string; onDone?(): void }) {
  const router = useRouter();
  const say = useSay();
  const { refusal, busy, attempt } = useChange();
  const { register, handleSubmit, reset, formState: { errors } } = useForm<z.input<typeof assessmentInput>>({ resolver: zodResolver(assessmentInput), defaultValues: { text: "" } });
  const submit = handleSubmit(async (input) => {
    if (!(await attempt(() => send("POST", `/api/drives/${driveId}/assessment`, input)))) return;
    reset();
    say({ text: "The assessment is in the log." });
    router.refresh();
    onDone?.();
  });
  return (
    <form noValidate onSubmit={submit} className="grid max-w-[640px] gap-3">
      <TextArea label="Assessment" rows={4} hint="What you looked at, what you conclude, and what may go on. It becomes a signed entry of this log." error={errors.text?.message} {...register("text")} />
      {refusal ? <Note kind="block" role="alert" title="Nothing was recorded.">{refusal}</Note> : null}
      <Buttons><Button type="submit" disabled={busy}>Record the assessment</Button></Buttons>
    </form>
  );
}
