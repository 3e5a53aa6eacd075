"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useState } from "react";
import { useForm } from "react-hook-form";
import type { z } from "zod";
import { Button, Buttons } from "@/components/ui/button";
import { Checkbox } from "@/components/ui/checkbox";
import { Dialog } from "@/components/ui/dialog";
import { Input } from "@/components/ui/input";
import { Note } from "@/components/ui/note";
import { TextArea } from "@/components/ui/text-area";
import { useSay } from "@/components/ui/toast";
import { Refusal, send } from "@/lib/http/send";
import { transferInput, type TransferInput } from "@/lib/schemas/approval";
import type { ApprovalView, ChipView } from "@/lib/views";
import { EncryptionNote } from "./encryption-note";
import { SiblingNote } from "./unit-note";

/** Records what was done at the bench: the image was written, or the chip itself was moved. */
export function TransferDialog({ onClose, chip, approval, onChanged }: { onClose(): void; chip: ChipView; approval: ApprovalView; onChanged(): Promise<unknown> }) {
  const say = useSay();
  const [refusal, setRefusal] = useState<string | null>(null);
  const { register, handleSubmit, formState: { errors, isSubmitting } } = useForm<z.input<typeof transferInput>, unknown, TransferInput>({
    resolver: zodResolver(transferInput),
    defaultValues: { kind: "write", donorChipId: approval.donorChipId, programmer: "", toolVersion: "", adapter: "", note: "" },
  });
  const donor = chip.pair?.designator ?? chip.designator;
  const submit = handleSubmit(async (input) => {
    setRefusal(null);
    try {
      await send("POST", `/api/approvals/${approval.id}/transfer`, input);
      await onChanged();
      say({ text: "The transfer is recorded. Now read back." });
      onClose();
    } catch (error) {
      if (!(error instanceof Refusal)) throw error;
      setRefusal(error.detail);
    }
  });
  return (
    <Dialog open onOpenChange={onClose} title="Record the transfer" description="Record it once it is done. Read-backs belong to the latest transfer, so each write is recorded on its own.">
      <form onSubmit={submit} noValidate className="grid gap-3.5">
        <fieldset className="grid gap-1.5">
          <legend className="mb-1 text-t2 font-semibold">What was done?</legend>
          <Checkbox type="radio" value="write" label={<><b>The approved image was written</b> to donor {donor}</>} {...register("kind")} />
          <Checkbox type="radio" value="chip-moved" label={<><b>The original chip was moved</b> to the donor board; the stored image is the safety copy</>} error={errors.kind?.message} {...register("kind")} />
        </fieldset>
        <SiblingNote chip={chip} />
        <EncryptionNote encryption={chip.drive.encryption} />
        <Input label="Programmer or tool" autoComplete="off" error={errors.programmer?.message} {...register("programmer")} />
        <Input label="Tool version" autoComplete="off" error={errors.toolVersion?.message} {...register("toolVersion")} />
        <Input label="Adapter" autoComplete="off" error={errors.adapter?.message} {...register("adapter")} />
        <TextArea label="Note" error={errors.note?.message} {...register("note")} />
        {refusal ? <Note kind="block" role="alert" title="This was not recorded.">{refusal}</Note> : null}
        <Buttons className="dialog-foot">
          <Button type="submit" variant="lead" disabled={isSubmitting}>Record the transfer</Button>
          <Button onClick={onClose}>Leave it</Button>
        </Buttons>
      </form>
    </Dialog>
  );
}
