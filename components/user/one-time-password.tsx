"use client";

import { Button, Buttons } from "@/components/ui/button";
import { CopyButton } from "@/components/ui/copy-button";
import { Dialog } from "@/components/ui/dialog";
import { Note } from "@/components/ui/note";

/** Shown once: it is stored as a hash only and can't be shown again. */
export function OneTimePassword({ shown, onClose }: { shown: { email: string; password: string } | null; onClose(): void }) {
  return (
    <Dialog open={shown !== null} onOpenChange={(open) => { if (!open) onClose(); }} title="One-time password">
      {shown ? (
        <>
          <p>For <b>{shown.email}</b>. Hand it over in person or by telephone, not by e-mail.</p>
          <p className="flex items-center gap-2 bg-well px-3 py-2.5"><code className="text-t5 font-semibold">{shown.password}</code><CopyButton text={shown.password} label="Copy the one-time password" done="Copied the one-time password." /></p>
          <Note kind="caution" title="It is shown only now.">At the first sign-in its owner chooses a password of their own. If it gets lost, make a new one.</Note>
          <Buttons><Button variant="lead" onClick={onClose}>I have passed it on</Button></Buttons>
        </>
      ) : null}
    </Dialog>
  );
}
