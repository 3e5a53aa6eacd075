"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useForm, useWatch } from "react-hook-form";
import type { z } from "zod";
import { FormDialog } from "@/components/ui/form-dialog";
import { Note } from "@/components/ui/note";
import { TextArea } from "@/components/ui/text-area";
import { useChange } from "@/components/ui/use-change";
import { send } from "@/lib/http/send";
import type { ChipSummary } from "@/lib/views";
import { changedFields } from "./changed-fields";
import { ChipFields } from "./chip-fields";
import { chipCorrectionForm, type ChipFormOutput } from "./chip-form";

export interface Given {
  chip: ChipSummary;
  originals: readonly ChipSummary[];
}

const typed = (value: unknown) => (typeof value === "string" || typeof value === "number" ? String(value) : "");

export function CorrectChipForm({ chip, originals, onClose }: Given & { onClose(): void }) {
  const router = useRouter();
  const { refusal, busy, attempt } = useChange();
  const before: ChipFormOutput = {
    designator: chip.designator, bus: chip.bus, sizeBytes: chip.sizeBytes, sizeSource: chip.sizeSource, supplyMillivolts: chip.supplyMillivolts ?? "unknown",
    package: chip.package, marking: chip.marking, holds: chip.holds,
    idBytes: chip.idBytes, sfdp: chip.sfdp, needsTransfer: chip.needsTransfer,
    pairedWith: chip.boardRole === "donor" ? chip.pair?.id ?? null : null,
  };
  const { register, handleSubmit, setError, setValue, control, formState: { errors } } = useForm<z.input<typeof chipCorrectionForm>, unknown, z.output<typeof chipCorrectionForm>>({
    resolver: zodResolver(chipCorrectionForm),
    defaultValues: { ...before, sizeBytes: String(chip.sizeBytes), supplyMillivolts: String(before.supplyMillivolts), pairedWith: before.pairedWith ?? "", reason: "" },
  });
  const [size, supply, marking, idBytes, sfdp, designator, pairedWith] = useWatch({ control, name: ["sizeBytes", "supplyMillivolts", "marking", "idBytes", "sfdp", "designator", "pairedWith"] }).map(typed);
  const submit = handleSubmit(async ({ reason, ...after }) => {
    const changes = changedFields(before, after);
    if (Object.keys(changes).length === 0) return setError("designator", { message: "These are the values on record. Change a field first." });
    if (!(await attempt(() => send("PATCH", `/api/chips/${chip.id}`, { changes, reason })))) return;
    router.refresh();
    onClose();
  });
  return (
    <FormDialog onClose={onClose} title={`Correct ${chip.designator}, ${chip.boardRole}`} description="The log keeps what was there before, what is there now and why. The reads are judged again." action="Record the correction" busy={busy} refusal={refusal} onSubmit={() => void submit()}>
      <ChipFields board={{ role: chip.boardRole, dataInController: false }} originals={originals} register={register} errors={errors} typed={{ size, supply, marking, idBytes, sfdp, designator, pairedWith }}
        onTakeSize={({ bytes, source }) => {
          setValue("sizeBytes", String(bytes), { shouldValidate: true });
          setValue("sizeSource", source);
        }} />
      <TextArea label="Reason" hint="Goes into the custody log as you type it." error={errors.reason?.message} {...register("reason")} />
      <Note kind="caution" title="Another size or another pair takes an approval away.">The image has to be approved again.</Note>
    </FormDialog>
  );
}
