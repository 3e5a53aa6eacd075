"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useForm } from "react-hook-form";
import { z } from "zod";
import { FormDialog } from "@/components/ui/form-dialog";
import { Input } from "@/components/ui/input";
import { TextArea } from "@/components/ui/text-area";
import { dueText } from "@/components/ui/times";
import { useChange } from "@/components/ui/use-change";
import { send } from "@/lib/http/send";
import { caseCorrection } from "@/lib/schemas/note";
import type { CaseView } from "@/lib/views";

const form = z.strictObject({ ...caseCorrection.shape.changes.shape, reason: caseCorrection.shape.reason });

export function CorrectCaseForm({ view, neededBy, onClose }: { view: CaseView; neededBy: string | null; onClose(): void }) {
  const router = useRouter();
  const { refusal, busy, attempt } = useChange();
  const before = {
    damage: view.damage, note: view.note, dueOn: view.dueOn, customerName: view.customer.name, customerEmail: view.customer.email,
    customerPhone: view.customer.phone, customerCompany: view.customer.company, returnAddress: view.customer.returnAddress,
  };
  const { register, handleSubmit, setError, formState: { errors } } = useForm<z.input<typeof form>, unknown, z.output<typeof form>>({ resolver: zodResolver(form), defaultValues: { ...before, reason: "" } });
  const submit = handleSubmit(async ({ reason, ...after }) => {
    const changes = Object.fromEntries(Object.entries(after).filter(([field, value]) => (value ?? null) !== (before[field as keyof typeof before] ?? null)));
    if (Object.keys(changes).length === 0) return setError("reason", { message: "These are the values on record. Change a field first." });
    if (!(await attempt(() => send("PATCH", `/api/cases/${view.id}`, { changes, reason })))) return;
    router.refresh();
    onClose();
  });
  return (
    <FormDialog onClose={onClose} title={`Correct case ${view.ref}`} description="The log keeps what was there before, what is there now and why; of the customer it only keeps that something was corrected." action="Record the correction" busy={busy} refusal={refusal} onSubmit={() => void submit()}>
      <div className="grid grid-cols-2 gap-4 slim:grid-cols-1">
        <TextArea label="Damage" className="col-span-full" error={errors.damage?.message} {...register("damage")} />
        <TextArea label="Bench note" className="col-span-full" error={errors.note?.message} {...register("note")} />
        <Input label="Due on" type="date" hint={neededBy ? `The customer asked for ${dueText(neededBy)}.` : undefined} error={errors.dueOn?.message} {...register("dueOn")} />
        <Input label="Customer’s name" error={errors.customerName?.message} {...register("customerName")} />
        <Input label="Company" error={errors.customerCompany?.message} {...register("customerCompany")} />
        <Input label="E-mail for the summary" type="email" error={errors.customerEmail?.message} {...register("customerEmail")} />
        <Input label="Telephone" type="tel" error={errors.customerPhone?.message} {...register("customerPhone")} />
        <TextArea label="Return address" error={errors.returnAddress?.message} {...register("returnAddress")} />
        <TextArea label="Reason" className="col-span-full" hint="Goes into the custody log as you type it." error={errors.reason?.message} {...register("reason")} />
      </div>
    </FormDialog>
  );
}
