"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { Controller, useForm, useWatch } from "react-hook-form";
import type { z } from "zod";
import { Checkbox } from "@/components/ui/checkbox";
import { FormDialog } from "@/components/ui/form-dialog";
import { Input } from "@/components/ui/input";
import { Note } from "@/components/ui/note";
import { TextArea } from "@/components/ui/text-area";
import { useSay } from "@/components/ui/toast";
import { useChange } from "@/components/ui/use-change";
import { mayBecome, OTHER_SERIAL_TEXT, OTHER_SERIAL_TITLE, serialMatches } from "@/lib/core/start-up";
import { send } from "@/lib/http/send";
import { type StartUpInput, startUpInput } from "@/lib/schemas/start-up";

type Form = z.input<typeof startUpInput>;

export function StartUpForm({ driveId, label, onClose }: { driveId: string; label: string | null; onClose(): void }) {
  const router = useRouter();
  const say = useSay();
  const { refusal, busy, attempt } = useChange();
  const { register, handleSubmit, control, formState: { errors, touchedFields } } = useForm<Form, unknown, StartUpInput>({ resolver: zodResolver(startUpInput), defaultValues: { reportedSerial: "", attempts: 1, note: "" } });
  const reported = useWatch({ control, name: "reportedSerial" });
  const serial = typeof reported === "string" ? reported : null;
  const isAnother = serialMatches(label, serial) === false && (touchedFields.reportedSerial === true || !mayBecome(label, serial));
  const submit = handleSubmit(async (input) => {
    if (!(await attempt(() => send("POST", `/api/drives/${driveId}/start-up-test`, input)))) return;
    say({ text: "The start-up test is recorded." });
    router.refresh();
    onClose();
  });
  const choice = (name: "spins" | "ready", legend: string, yes: string, no: string) => (
    <Controller control={control} name={name} render={({ field }) => (
      <fieldset className="grid content-start gap-1">
        <legend className="mb-1 text-t2 font-semibold">{legend}</legend>
        <Checkbox type="radio" name={name} label={yes} checked={field.value === true} onChange={() => field.onChange(true)} onBlur={field.onBlur} />
        <Checkbox type="radio" name={name} label={no} checked={field.value === false} onChange={() => field.onChange(false)} onBlur={field.onBlur} error={errors[name]?.message} />
      </fieldset>
    )} />
  );
  return (
    <FormDialog onClose={onClose} title="Record the start-up test" action="Record the test" busy={busy} refusal={refusal} onSubmit={() => void submit()}
      description="From the first power-on on the drive a read-back that differs is a note: drives rewrite their chips.">
      <div className="grid grid-cols-2 gap-4 slim:grid-cols-1">
        {choice("spins", "Does it spin?", "It spins", "It does not spin")}
        {choice("ready", "Does it get ready?", "It gets ready", "It does not get ready")}
        <Input label="Serial that the drive reports" mono autoComplete="off" hint={label ? `On the label: ${label}. Leave empty when it reports none.` : "No serial of the label is recorded. Leave empty when it reports none."} error={errors.reportedSerial?.message} {...register("reportedSerial")} />
        <Input label="Attempts" type="number" min={1} max={100} inputMode="numeric" hint="How often it was powered" error={errors.attempts?.message} {...register("attempts", { valueAsNumber: true })} />
        {isAnother ? <div className="col-span-full"><Note kind="block" role="alert" title={OTHER_SERIAL_TITLE}>{OTHER_SERIAL_TEXT} Record the test all the same.</Note></div> : null}
        <TextArea label="Note" className="col-span-full" hint="Sounds, smells, current, how long it took" error={errors.note?.message} {...register("note")} />
      </div>
    </FormDialog>
  );
}
