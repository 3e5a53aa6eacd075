"use client";

import { useRouter } from "next/navigation";
import { useForm } from "react-hook-form";
import type { z } from "zod";
import { Button, Buttons } from "@/components/ui/button";
import { Note } from "@/components/ui/note";
import { rulesFrom } from "@/components/ui/rules";
import { TextArea } from "@/components/ui/text-area";
import { useSay } from "@/components/ui/toast";
import { useChange } from "@/components/ui/use-change";
import { send } from "@/lib/http/send";
import type { assessmentInput } from "@/lib/schemas/policy";

const rules = rulesFrom(() => import("@/lib/schemas/policy").then((m) => m.assessmentInput));

/** An auditor says what to think of a log that does not check out; work on a drive opens again after it. */
export function AssessmentForm({ chainId, onDone }: { chainId: string; onDone?(): void }) {
  const router = useRouter();
  const say = useSay();
  const { refusal, busy, attempt } = useChange();
  const { register, handleSubmit, reset, formState: { errors, isSubmitting } } = useForm<z.input<typeof assessmentInput>>({ resolver: rules, defaultValues: { text: "" } });
  const submit = handleSubmit(async (input) => {
    if (!(await attempt(() => send("POST", `/api/audit/checks/${chainId}/assessment`, input)))) return;
    reset();
    say({ text: "The assessment is in the log." });
    router.refresh();
    onDone?.();
  });
  return (
    <form noValidate onSubmit={submit} className="grid max-w-[640px] gap-3">
      <TextArea label="Assessment" rows={4} hint="What you looked at, what you conclude, and what may go on. It becomes a signed entry of this log." error={errors.text?.message} {...register("text")} />
      {refusal ? <Note kind="block" role="alert" title="Nothing was recorded.">{refusal}</Note> : null}
      <Buttons><Button type="submit" disabled={busy || isSubmitting}>Record the assessment</Button></Buttons>
    </form>
  );
}

/** What to do below a check that found something. `latest` is the action of the log's last entry. */
export function Assess({ chainId, latest, assesses, onDone }: { chainId: string; latest: string | undefined; assesses: boolean; onDone?(): void }) {
  return (
    <div className="mt-5">
      {latest === "log.assessed" ? <Note kind="note" title="An assessment stands at the end of this log." className="mb-3">Read it in the latest entry before you add another.</Note> : null}
      {assesses ? <AssessmentForm chainId={chainId} onDone={onDone} /> : <p className="text-ink-2">An auditor can record an assessment here.</p>}
    </div>
  );
}
