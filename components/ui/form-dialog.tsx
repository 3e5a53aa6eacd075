"use client";

import type { ReactNode } from "react";
import { Button, Buttons, type ButtonVariant } from "./button";
import { Dialog } from "./dialog";
import { Note } from "./note";

/** A form that asks before it does something. A refusal stays here, with what was typed. Mount it only while it is open. */
export function FormDialog({ onClose, title, description, action, variant = "lead", busy, refusal, reason, onSubmit, children }: {
  onClose(): void;
  title: ReactNode;
  description?: ReactNode;
  /** the button's words */
  action: string;
  variant?: ButtonVariant;
  busy: boolean;
  refusal: string | null;
  /** why it can't be done yet */
  reason?: string | null;
  onSubmit(): void;
  children?: ReactNode;
}) {
  return (
    <Dialog open onOpenChange={(next) => { if (!next) onClose(); }} title={title} description={description}>
      <form noValidate className="grid gap-4" onSubmit={(event) => { event.preventDefault(); onSubmit(); }}>
        {children}
        {refusal ? <Note kind="block" role="alert" title="This was not done.">{refusal}</Note> : null}
        <Buttons>
          <Button type="submit" variant={variant} disabled={busy} reason={reason}>{action}</Button>
          <Button onClick={onClose}>Leave it</Button>
        </Buttons>
      </form>
    </Dialog>
  );
}
