"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useState, type ReactNode } from "react";
import { useForm } from "react-hook-form";
import { Button, Buttons } from "@/components/ui/button";
import { Dialog } from "@/components/ui/dialog";
import { Note } from "@/components/ui/note";
import { TextArea } from "@/components/ui/text-area";
import { Refusal } from "@/lib/http/send";
import { type ReasonInput, reasonInput } from "@/lib/schemas/read";

/** Asks for a reason, then does it. A refusal stays here, with what was typed. */
export function ReasonDialog({ open, onClose, title, description, label = "Reason", hint, action, variant = "lead", children, onReason }: {
  open: boolean;
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
  /** does it; a Refusal thrown here is shown */
  onReason(reason: string): Promise<void>;
}) {
  const [refusal, setRefusal] = useState<string | null>(null);
  const { register, handleSubmit, reset, formState: { errors, isSubmitting } } = useForm<ReasonInput>({ resolver: zodResolver(reasonInput), defaultValues: { reason: "" } });
  function close() {
    setRefusal(null);
    reset();
    onClose();
  }
  const submit = handleSubmit(async ({ reason }) => {
    setRefusal(null);
    try {
      await onReason(reason);
      close();
    } catch (error) {
      if (!(error instanceof Refusal)) throw error;
      setRefusal(error.detail);
    }
  });
  return (
    <Dialog open={open} onOpenChange={(next) => { if (!next) close(); }} title={title} description={description}>
      <form onSubmit={submit} noValidate className="grid gap-4">
        {children}
        <TextArea label={label} hint={hint ?? "Goes into the custody log as you type it."} error={errors.reason?.message} {...register("reason")} />
        {refusal ? <Note kind="block" role="alert" title="This was not done.">{refusal}</Note> : null}
        <Buttons>
          <Button type="submit" variant={variant} disabled={isSubmitting}>{action}</Button>
          <Button onClick={close}>Leave it</Button>
        </Buttons>
      </form>
    </Dialog>
  );
}
