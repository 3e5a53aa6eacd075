"use client";

import { useState } from "react";
import { Button, Buttons } from "@/components/ui/button";
import { Dialog } from "@/components/ui/dialog";
import { Note } from "@/components/ui/note";
import { Refusal } from "@/lib/http/send";

/** Asks before something that is felt at once; a refusal stays here. */
export function ConfirmChange({ title, children, action, variant = "lead", onConfirm, onClose }: { title: string; children: string; action: string; variant?: "lead" | "stop"; onConfirm(): Promise<void>; onClose(): void }) {
  const [refusal, setRefusal] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  async function confirm() {
    setBusy(true);
    setRefusal(null);
    try {
      await onConfirm();
    } catch (error) {
      if (!(error instanceof Refusal)) throw error;
      setRefusal(error.detail);
    } finally {
      setBusy(false);
    }
  }
  return (
    <Dialog open onOpenChange={(open) => { if (!open) onClose(); }} title={title}>
      <p>{children}</p>
      {refusal ? <Note kind="block" role="alert" title="This was not done.">{refusal}</Note> : null}
      <Buttons><Button variant={variant} disabled={busy} onClick={() => void confirm()}>{action}</Button><Button onClick={onClose}>Leave it</Button></Buttons>
    </Dialog>
  );
}
