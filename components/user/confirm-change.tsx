"use client";

import { Button, Buttons } from "@/components/ui/button";
import { Dialog } from "@/components/ui/dialog";
import { Note } from "@/components/ui/note";
import { useChange } from "@/components/ui/use-change";

/** Asks before something that is felt at once; a refusal stays here. */
export function ConfirmChange({ title, children, action, variant = "lead", onConfirm, onClose }: { title: string; children: string; action: string; variant?: "lead" | "stop"; onConfirm(): Promise<void>; onClose(): void }) {
  const { refusal, busy, attempt } = useChange();
  return (
    <Dialog open onOpenChange={(open) => { if (!open) onClose(); }} title={title}>
      <p>{children}</p>
      {refusal ? <Note kind="block" role="alert" title="This was not done.">{refusal}</Note> : null}
      <Buttons><Button variant={variant} disabled={busy} onClick={() => void attempt(onConfirm)}>{action}</Button><Button onClick={onClose}>Leave it</Button></Buttons>
    </Dialog>
  );
}
