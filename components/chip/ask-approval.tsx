"use client";

import { useState } from "react";
import { useForm } from "react-hook-form";
import type { z } from "zod";
import { Button, Buttons } from "@/components/ui/button";
import { Note } from "@/components/ui/note";
import { rulesFrom } from "@/components/ui/rules";
import { TextArea } from "@/components/ui/text-area";
import { useSay } from "@/components/ui/toast";
import { Working } from "@/components/ui/working";
import { countOf } from "@/lib/core/quantity";
import { Refusal, send } from "@/lib/http/send";
import type { ApprovalRequestInput, approvalRequestInput } from "@/lib/schemas/approval";
import type { ChipView } from "@/lib/views";

const rules = rulesFrom(() => import("@/lib/schemas/approval").then((m) => m.approvalRequestInput));

/** Lines that keep the request closed, in words; null when a lead can be asked. */
function closedBecause(chip: ChipView): string | null {
  const open = chip.conditions.filter((c) => c.state !== "met").length;
  if (open === 0) return null;
  return `${countOf(open, "line")} ${open === 1 ? "is" : "are"} still open.`;
}

export function AskApproval({ chip, onChanged }: { chip: ChipView; onChanged(): Promise<unknown> }) {
  const say = useSay();
  const [refusal, setRefusal] = useState<string | null>(null);
  const { register, handleSubmit, reset, formState: { errors, isSubmitting } } = useForm<z.input<typeof approvalRequestInput>, unknown, ApprovalRequestInput>({ resolver: rules, defaultValues: { message: "" } });
  // findings that a lead may answer with a reason do not close the request
  const askable = chip.state.state === "ready" || (chip.state.state === "held" && chip.reads.every((r) => r.stage !== "before" || !r.counted || r.findings.every((f) => f.severity !== "blocks")));
  const closed = askable ? null : closedBecause(chip);
  const submit = handleSubmit(async (input) => {
    setRefusal(null);
    try {
      await send("POST", `/api/chips/${chip.id}/approval-request`, input);
      await onChanged();
      reset();
      say({ text: "The lead is asked." });
    } catch (error) {
      if (!(error instanceof Refusal)) throw error;
      setRefusal(error.detail);
    }
  });
  return (
    <form onSubmit={submit} noValidate className="no-print grid gap-3.5">
      <TextArea label="Message to the lead" disabled={Boolean(closed)} placeholder={closed ? "Opens when every line is met" : ""} error={errors.message?.message} {...register("message")} />
      {refusal ? <Note kind="block" role="alert" title="Nobody was asked.">{refusal}</Note> : null}
      <Buttons><Button type="submit" reason={closed} disabled={isSubmitting}>Ask for approval</Button></Buttons>
      {isSubmitting ? <Working what="The leads are being asked" note="It is done as a whole or not at all." /> : null}
    </form>
  );
}
