"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useForm, useWatch } from "react-hook-form";
import { z } from "zod";
import { FormDialog } from "@/components/ui/form-dialog";
import { TextArea } from "@/components/ui/text-area";
import { useChange } from "@/components/ui/use-change";
import { send } from "@/lib/http/send";
import { driveCorrection } from "@/lib/schemas/drive";
import type { DriveView } from "@/lib/views";
import { changedFields } from "./changed-fields";
import { DriveFields } from "./drive-fields";
import { DriveWarningList, useDriveWarnings } from "./drive-warning-list";

const form = z.strictObject({ ...driveCorrection.shape.changes.shape, reason: driveCorrection.shape.reason });
const typed = (value: unknown) => (typeof value === "string" ? value : "");
const NOTHING = "These are the values on record. Change a field first.";

export function CorrectDriveForm({ drive, onClose }: { drive: DriveView; onClose(): void }) {
  const router = useRouter();
  const { refusal, busy, attempt } = useChange();
  const before = { partNumber: drive.partNumber, model: drive.model, serial: drive.serial, interface: drive.interface, capacity: drive.capacity, made: drive.made, firmware: drive.firmware, encryption: drive.encryption };
  const { register, handleSubmit, setError, control, formState: { errors } } = useForm<z.input<typeof form>, unknown, z.output<typeof form>>({ resolver: zodResolver(form), defaultValues: { ...before, encryption: drive.encryption ?? "", reason: "" } });
  const [serial, partNumber, encryption] = useWatch({ control, name: ["serial", "partNumber", "encryption"] }).map(typed);
  const warnings = useDriveWarnings(drive.caseId, { serial, partNumber }, drive.id);
  const submit = handleSubmit(async ({ reason, ...after }) => {
    const changes = changedFields(before, after);
    if (Object.keys(changes).length === 0) return setError("partNumber", { message: NOTHING });
    if (!(await attempt(() => send("PATCH", `/api/drives/${drive.id}`, { changes, reason })))) return;
    router.refresh();
    onClose();
  });
  return (
    <FormDialog onClose={onClose} title={`Correct Drive ${drive.letter}`} description="The log keeps what was there before, what is there now and why." action="Record the correction" busy={busy} refusal={refusal} onSubmit={() => void submit()}>
      <DriveFields register={register} errors={errors} encryption={encryption} />
      <DriveWarningList warnings={warnings} live />
      <TextArea label="Reason" hint="Goes into the custody log as you type it." error={errors.reason?.message} {...register("reason")} />
    </FormDialog>
  );
}
