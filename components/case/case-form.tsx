"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useForm } from "react-hook-form";
import type { z } from "zod";
import { Button, ButtonLink, Buttons } from "@/components/ui/button";
import { Input } from "@/components/ui/input";
import { Note } from "@/components/ui/note";
import { TextArea } from "@/components/ui/text-area";
import { useChange } from "@/components/ui/use-change";
import { send } from "@/lib/http/send";
import { type CaseInput, caseInput } from "@/lib/schemas/case";

/** Records a case and opens it, where its drives are added. */
export function CaseForm({ note = "" }: { note?: string }) {
  const router = useRouter();
  const { refusal, busy, attempt } = useChange();
  const { register, handleSubmit, formState: { errors, isSubmitSuccessful } } = useForm<z.input<typeof caseInput>, unknown, CaseInput>({
    resolver: zodResolver(caseInput), defaultValues: { customer: { name: "", email: "", phone: "", contact: "" }, damage: "", note, dueOn: "" },
  });
  const submit = handleSubmit(async (input) => {
    await attempt(async () => {
      const made = await send<{ id: string; ref: string }>("POST", "/api/cases", input);
      router.push(`/cases/${made.id}`);
    });
  });
  return (
    <form noValidate onSubmit={submit} className="grid max-w-[760px] gap-5">
      <div className="grid grid-cols-2 gap-4 slim:grid-cols-1">
        <Input label="Customer" autoComplete="off" error={errors.customer?.name?.message} {...register("customer.name")} />
        <Input label="Contact" hint="Who to ask for, if it is a company" autoComplete="off" error={errors.customer?.contact?.message} {...register("customer.contact")} />
        <Input label="E-mail address" type="email" autoComplete="off" hint="The summary goes here" error={errors.customer?.email?.message} {...register("customer.email")} />
        <Input label="Telephone" type="tel" autoComplete="off" error={errors.customer?.phone?.message} {...register("customer.phone")} />
      </div>
      <TextArea label="Damage" rows={3} hint="What happened, and what was done before it came. Leave names out: this goes into the log." error={errors.damage?.message} {...register("damage")} />
      <div className="grid grid-cols-[minmax(0,1fr)_200px] gap-4 slim:grid-cols-1">
        <TextArea label="Bench note" rows={2} error={errors.note?.message} {...register("note")} />
        <Input label="Due date" type="date" hint="Leave empty when none was agreed" error={errors.dueOn?.message} {...register("dueOn")} />
      </div>
      <Note kind="note" title="The customer has to own the drive or act for its owner.">Local law and the workshop’s own licensed practice come before anything this screen says.</Note>
      {refusal ? <Note kind="block" role="alert" title="The case was not recorded.">{refusal}</Note> : null}
      <Buttons>
        <Button type="submit" variant="lead" disabled={busy || (isSubmitSuccessful && !refusal)}>Record the case</Button>
        <ButtonLink href="/cases">Leave it</ButtonLink>
      </Buttons>
    </form>
  );
}
