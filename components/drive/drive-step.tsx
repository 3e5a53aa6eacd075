"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useState } from "react";
import { useForm, useWatch } from "react-hook-form";
import type { z } from "zod";
import { Button } from "@/components/ui/button";
import { FormBody } from "@/components/ui/form-dialog";
import { Note } from "@/components/ui/note";
import { useChange } from "@/components/ui/use-change";
import { send } from "@/lib/http/send";
import { type DriveInput, driveInput } from "@/lib/schemas/drive";
import { DriveFields } from "./drive-fields";
import { DriveWarningList, useDriveWarnings } from "./drive-warning-list";
import type { StepGiven } from "./flow-given";
import { goOnWords } from "./flow";
import { keepUsed, lastUsed } from "./last-used";

export type DriveProposal = Partial<Record<"partNumber" | "model" | "serial" | "interface" | "capacity" | "made" | "firmware" | "encryption", string>>;

const typed = (value: unknown) => (typeof value === "string" ? value : "");

/** The drive's label. What the customer asked with is filled in; of what was used last only the interface. */
export function DriveStep({ caseId, proposed, userId, onClose, onSaved }: StepGiven & { caseId: string; proposed: DriveProposal; onSaved(driveId: string, goOn: boolean): Promise<void> }) {
  const { refusal, busy, attempt } = useChange();
  const [used] = useState(() => lastUsed(userId));
  const { register, handleSubmit, control, formState: { errors } } = useForm<z.input<typeof driveInput>, unknown, DriveInput>({
    resolver: zodResolver(driveInput),
    defaultValues: { partNumber: "", serial: "", model: "", capacity: "", made: "", firmware: "", encryption: "", interface: used.interface?.[0] ?? "", ...proposed },
  });
  const [serial, partNumber, encryption] = useWatch({ control, name: ["serial", "partNumber", "encryption"] }).map(typed);
  const warnings = useDriveWarnings(caseId, { serial, partNumber });
  const save = (goOn: boolean) => handleSubmit((input) => attempt(async () => {
    const { id } = await send<{ id: string }>("POST", `/api/cases/${caseId}/drives`, input);
    keepUsed(userId, input);
    await onSaved(id, goOn);
  }).then(() => undefined))();
  return (
    <FormBody onClose={onClose} action={goOnWords({ kind: "drive" }, null) ?? "Add the drive"} busy={busy} refusal={refusal} onSubmit={() => void save(true)}
      also={<Button disabled={busy} onClick={() => void save(false)}>Add the drive</Button>}>
      {Object.values(proposed).some(Boolean) ? <Note kind="note" title="Filled in from the customer’s request.">Hold it against the label before you save.</Note> : null}
      <DriveFields register={register} errors={errors} encryption={encryption} used={used} />
      <DriveWarningList warnings={warnings} live />
      {encryption === "suspected" || encryption === "yes" ? null : <Note kind="caution" title="Keep the enclosure’s small board with the drive.">It may hold the key to the data.</Note>}
    </FormBody>
  );
}
