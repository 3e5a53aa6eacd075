"use client";

import type { KeyboardEvent, ReactNode } from "react";
import { Button, Buttons, type ButtonVariant } from "./button";
import { Dialog } from "./dialog";
import { Note } from "./note";
import { Working } from "./working";

/** A form that asks before it does something. A refusal stays here, with what was typed. Mount it only while it is open. */
export function FormDialog({ title, description, ...form }: FormWords & { title: ReactNode; description?: ReactNode }) {
  return (
    <Dialog open onOpenChange={(next) => { if (!next) form.onClose(); }} title={title} description={description}>
      <FormBody {...form} />
    </Dialog>
  );
}

interface FormWords {
  onClose(): void;
  /** the button's words */
  action: string;
  variant?: ButtonVariant;
  busy: boolean;
  refusal: string | null;
  /** why it can't be done yet */
  reason?: string | null;
  onSubmit(): void;
  /** how far it is, while it is busy */
  far?: string | null;
  /** ends what goes on; without it, it can't be stopped half-way */
  onStop?(): void;
  /** further buttons, between the first and "Leave it" */
  also?: ReactNode;
  children?: ReactNode;
}

/** The form by itself, for a dialog that goes from one form to the next. Enter submits from every field, from a text of several lines with Ctrl. */
export function FormBody({ onClose, action, variant = "lead", busy, refusal, reason, also, far, onStop, onSubmit, children }: FormWords) {
  function onKeyDown(event: KeyboardEvent<HTMLFormElement>) {
    // a closed list would only open by Enter: Space and the arrow keys do that, and Enter means the same in every field
    const submits = event.target instanceof HTMLSelectElement || event.ctrlKey || event.metaKey;
    if (event.key !== "Enter" || !submits) return;
    event.preventDefault();
    event.currentTarget.requestSubmit();
  }
  return (
    <form noValidate className="grid gap-4" onKeyDown={onKeyDown} onSubmit={(event) => { event.preventDefault(); if (!busy && !reason) onSubmit(); }}>
      {children}
      {refusal ? <Note kind="block" role="alert" title="This was not done.">{refusal}</Note> : null}
      {busy ? <Working what={`“${action.replace(/…$/, "")}” is under way`} far={far} onStop={onStop} note={onStop ? undefined : "It is done as a whole or not at all, so it can’t be stopped half-way; it goes on when you close this."} /> : null}
      <Buttons className="dialog-foot">
        <Button type="submit" variant={variant} disabled={busy} reason={reason}>{action}</Button>
        {also}
        <Button onClick={onClose}>Leave it</Button>
      </Buttons>
    </form>
  );
}
