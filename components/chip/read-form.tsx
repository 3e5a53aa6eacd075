"use client";

import { useState } from "react";
import { useSay } from "@/components/ui/toast";
import type { Format } from "@/lib/core/words";
import { save, send } from "@/lib/http/send";
import type { ChipView, ReadView } from "@/lib/views";
import { nameOf } from "./chip-words";
import { EncryptionNote } from "./encryption-note";
import { FormatChoice } from "./format-choice";
import { ReasonForm } from "./reason-form";

export type ReadAction = "set-aside" | "count-again" | "download";

export interface AskedOfRead {
  read: ReadView;
  action: ReadAction;
}

/** Set aside, count again and hand out all ask for a reason first. */
export function ReadForm({ asked: { read, action }, chip, onClose, onChanged }: {
  asked: AskedOfRead;
  chip: ChipView;
  onClose(): void;
  onChanged(): Promise<unknown>;
}) {
  const say = useSay();
  const [format, setFormat] = useState<Format>("raw");
  const name = nameOf(read);
  const standing = chip.approval && read.stage === "before" ? "An approval stands: this may revoke it." : null;

  if (action === "set-aside") {
    return (
      <ReasonForm onClose={onClose} title={`Set ${name} aside`} action={`Set ${name} aside`} label="What was wrong with it?"
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
      <ReasonForm onClose={onClose} title={`Count ${name} again`} action={`Count ${name} again`} label="Why does it count after all?"
        description={<>It takes part in the agreement from now on. {standing}</>}
        onReason={async (reason) => {
          await send("POST", `/api/reads/${read.id}/count-again`, { reason });
          await onChanged();
          say({ text: `${name} counts again.` });
        }} />
    );
  }
  return (
    <ReasonForm onClose={onClose} title={`Download ${name}`} action="Download" label="What is it for?" saves
      description={`${read.derived ? "A composite, no read. " : ""}It leaves the house as a file. Who, when and what for goes into the log before the first byte.`}
      onReason={async (reason, coming) => {
        const file = await save(`/api/reads/${read.id}/download`, { reason, format }, coming);
        say({ text: `${name} was saved as ${file}.` });
      }}>
      <EncryptionNote encryption={chip.drive.encryption} />
      <FormatChoice label="As what" value={format} onChoose={setFormat} />
    </ReasonForm>
  );
}
