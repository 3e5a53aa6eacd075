"use client";

import { useState } from "react";
import { useSay } from "@/components/ui/toast";
import type { Format } from "@/lib/core/words";
import { save, send } from "@/lib/http/send";
import type { ChipView, ReadView } from "@/lib/views";
import { nameOf } from "./chip-words";
import { EncryptionNote } from "./encryption-note";
import { FormatChoice } from "./format-choice";
import { ReasonDialog } from "./reason-dialog";

export type ReadAction = "set-aside" | "count-again" | "download";

/** Set aside, count again and hand out all ask for a reason first. */
export function ReadDialogs({ asked, chip, onClose, onChanged }: {
  asked: { read: ReadView; action: ReadAction } | null;
  chip: ChipView;
  onClose(): void;
  onChanged(): Promise<unknown>;
}) {
  const say = useSay();
  const [format, setFormat] = useState<Format>("raw");
  if (!asked) return null;
  const { read, action } = asked;
  const name = nameOf(read);
  const standing = chip.approval && read.stage === "before" ? "An approval stands: this may revoke it." : null;

  if (action === "set-aside") {
    return (
      <ReasonDialog open onClose={onClose} title={`Set ${name} aside`} action={`Set ${name} aside`} label="What was wrong with it?"
        description={<>The image stays stored and can be counted again. It no longer counts for agreement. {standing}</>}
        onReason={async (reason) => {
          await send("POST", `/api/reads/${read.id}/set-aside`, { reason });
          await onChanged();
          say({ text: `${name} is set aside. The file is kept.` });
        }} />
    );
  }
  if (action === "count-again") {
    return (
      <ReasonDialog open onClose={onClose} title={`Count ${name} again`} action={`Count ${name} again`} label="Why does it count after all?"
        description={<>It takes part in the agreement from now on. {standing}</>}
        onReason={async (reason) => {
          await send("POST", `/api/reads/${read.id}/count-again`, { reason });
          await onChanged();
          say({ text: `${name} counts again.` });
        }} />
    );
  }
  return (
    <ReasonDialog open onClose={onClose} title={`Download ${name}`} action="Download" label="What is it for?"
      description={`${read.derived ? "A composite, no read. " : ""}It leaves the house as a file. Who, when and what for goes into the log before the first byte.`}
      onReason={async (reason) => {
        const file = await save(`/api/reads/${read.id}/download`, { reason, format });
        say({ text: `${name} was saved as ${file}.` });
      }}>
      <EncryptionNote encryption={chip.drive.encryption} />
      <FormatChoice label="As what" value={format} onChoose={setFormat} />
    </ReasonDialog>
  );
}
