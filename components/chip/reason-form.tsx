"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useState, type ReactNode } from "react";
import { useForm } from "react-hook-form";
import { FormDialog } from "@/components/ui/form-dialog";
import { TextArea } from "@/components/ui/text-area";
import { useChange } from "@/components/ui/use-change";
import { comeText } from "@/lib/core/quantity";
import { type ReasonInput, reasonInput } from "@/lib/schemas/read";

/** What a file that is saved tells while it comes, and how it is stopped: the last input of `save`. */
export interface Coming {
  signal: AbortSignal;
  onBytes(come: number, of: number | null): void;
}

/** Asks for a reason, then does it. A refusal stays here, with what was typed. */
export function ReasonForm({ onClose, title, description, label = "Reason", hint, action, variant = "lead", children, saves = false, onReason }: {
  onClose(): void;
  title: string;
  description?: ReactNode;
  label?: string;
  hint?: string;
  /** the button's words */
  action: string;
  variant?: "lead" | "stop";
  /** what else is asked, above the reason */
  children?: ReactNode;
  /** it saves a file: tells how far it has come, and can be stopped */
  saves?: boolean;
  /** does it; a Refusal thrown here is shown */
  onReason(reason: string, coming: Coming): Promise<void>;
}) {
  const { refusal, busy, attempt, stop } = useChange();
  const [far, setFar] = useState<string | null>(null);
  const { register, handleSubmit, formState: { errors } } = useForm<ReasonInput>({ resolver: zodResolver(reasonInput), defaultValues: { reason: "" } });
  const submit = handleSubmit(async ({ reason }) => {
    if (await attempt((signal) => onReason(reason, { signal, onBytes: (come, of) => setFar(comeText(come, of)) }))) onClose();
  });
  return (
    <FormDialog onClose={onClose} title={title} description={description} action={action} variant={variant} busy={busy} refusal={refusal} far={far} onStop={saves ? stop : undefined} onSubmit={() => void submit()}>
      {children}
      <TextArea label={label} hint={hint ?? "Goes into the custody log as you type it."} error={errors.reason?.message} {...register("reason")} />
    </FormDialog>
  );
}
