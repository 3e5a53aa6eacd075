"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useForm } from "react-hook-form";
import { FormDialog } from "@/components/ui/form-dialog";
import { Input } from "@/components/ui/input";
import { Note } from "@/components/ui/note";
import { TextArea } from "@/components/ui/text-area";
import { useSay } from "@/components/ui/toast";
import { useChange } from "@/components/ui/use-change";
import { countOf, listText } from "@/lib/core/quantity";
import { send } from "@/lib/http/send";
import { type ErasureInput, erasureInput } from "@/lib/schemas/erasure";
import type { ErasureView } from "@/lib/views";
import { amountText } from "./erasure-words";
import { ItemList } from "./item-list";

export function EraseForm({ view, onClose }: { view: ErasureView; onClose(): void }) {
  const router = useRouter();
  const say = useSay();
  const { refusal, busy, attempt } = useChange();
  const { goes, stays, photos, bytes, unverified } = view;
  const { register, handleSubmit, formState: { errors } } = useForm<ErasureInput>({ resolver: zodResolver(erasureInput), defaultValues: { caseRef: "", reason: "" } });
  const submit = handleSubmit(async (input) => {
    if (!(await attempt(() => send("POST", `/api/cases/${view.caseId}/erasure`, input)))) return;
    say({ text: `The images of case ${view.caseRef} are erased. The certificate can be printed on its page.` });
    router.refresh();
    onClose();
  });
  return (
    <FormDialog onClose={onClose} title={<>Erase the images of case <span className="whitespace-nowrap">{view.caseRef}</span></>} action="Erase the images" variant="stop" busy={busy} refusal={refusal} onSubmit={() => void submit()}
      description="Their bytes leave Twinread’s store for good. The customer gets a mail that says so.">
      <Note kind="block" title="This can’t be undone.">Make the case bundle first if you want to keep a copy.</Note>
      {unverified.length > 0 ? <Note kind="caution" title={`${listText(unverified)} ${unverified.length === 1 ? "was" : "were"} never verified.`}>What is erased here may be the only copy of what makes this drive start.</Note> : null}
      {goes.length > 0 ? (
        <div className="grid gap-1.5">
          <h3 className="text-t3 font-bold">What goes: {amountText({ images: goes.length - photos, photos, bytes })}</h3>
          <ItemList items={goes} label="What goes" />
        </div>
      ) : null}
      <div className="grid gap-1.5">
        <h3 className="text-t3 font-bold">What stays</h3>
        <p className="text-t2">The log, every read with its digests and findings, and what the customer typed on the form. Bundles that left the house, chips on boards and backups are not reached.</p>
        {stays.length > 0 ? <><p className="text-t2">{countOf(stays.length, "image")} of this case {stays.length === 1 ? "stays" : "stay"} stored, because exactly the same bytes are used elsewhere:</p><ItemList items={stays} label="What stays stored" /></> : null}
      </div>
      <Input label="Case number" hint={`Type ${view.caseRef}, so that it is this case and no other.`} autoComplete="off" className="max-w-[220px]" error={errors.caseRef?.message} {...register("caseRef")} />
      <TextArea label="Reason" hint="Goes into the log as you type it. Write no customer’s name." rows={3} error={errors.reason?.message} {...register("reason")} />
    </FormDialog>
  );
}
