"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useForm, useWatch } from "react-hook-form";
import type { z } from "zod";
import { FormDialog } from "@/components/ui/form-dialog";
import { Input } from "@/components/ui/input";
import { Note } from "@/components/ui/note";
import { Select } from "@/components/ui/select";
import { TextArea } from "@/components/ui/text-area";
import { useChange } from "@/components/ui/use-change";
import { send } from "@/lib/http/send";
import { type HandOverInput, handOverInput } from "@/lib/schemas/hand-over";
import type { ItemView, PersonView } from "@/lib/views";

/** Hands one item over. Who has an account confirms for themselves; for anybody else it is written down how they did. */
export function HandOverForm({ driveId, item, user, receivers, onClose }: { driveId: string; item: ItemView; user: { name: string }; receivers: PersonView[]; onClose(): void }) {
  const router = useRouter();
  const { refusal, busy, attempt } = useChange();
  const { register, handleSubmit, setValue, control, formState: { errors } } = useForm<z.input<typeof handOverInput>, unknown, HandOverInput>({
    resolver: zodResolver(handOverInput),
    defaultValues: { item: { type: item.type, id: item.id }, from: item.at?.to ?? { person: user.name, place: "" }, to: { person: "", place: "", userId: "" }, condition: item.at?.condition ?? "", sealNumber: item.at?.sealNumber ?? "", note: "" },
  });
  const userId = useWatch({ control, name: "to.userId" });
  const account = register("to.userId");
  const submit = handleSubmit(async (input) => {
    if (!(await attempt(() => send("POST", `/api/drives/${driveId}/hand-over`, input)))) return;
    router.refresh();
    onClose();
  });
  return (
    <FormDialog onClose={onClose} title={`Hand over ${item.name}`} action="Record the hand-over" busy={busy} refusal={refusal} onSubmit={() => void submit()}
      description="Both sides confirm: you by recording it, the receiver afterwards. Until then it counts as being with you.">
      <div className="grid grid-cols-2 gap-4 slim:grid-cols-1">
        <Input label="From whom" error={errors.from?.person?.message} {...register("from.person")} />
        <Input label="From where" hint="Room, shelf or address" error={errors.from?.place?.message} {...register("from.place")} />
        <Select label="To whom" error={errors.to?.userId?.message} options={[{ value: "", label: "Somebody without an account" }, ...receivers.map((one) => ({ value: one.id, label: `${one.name} (${one.role})` }))]}
          {...account} onChange={(event) => {
            void account.onChange(event);
            setValue("to.person", receivers.find((one) => one.id === event.target.value)?.name ?? "");
          }} />
        <Input label="Their name" readOnly={Boolean(userId)} hint={userId ? "From their account" : "Customer, carrier or another workshop"} error={errors.to?.person?.message} {...register("to.person")} />
        <Input label="To where" className="col-span-full" hint="Where it is when they have it" error={errors.to?.place?.message} {...register("to.place")} />
        <TextArea label="Condition" className="col-span-full" hint="What you see now, bag and seal included" error={errors.condition?.message} {...register("condition")} />
        <Input label="Number of its seal" mono hint="Leave empty when there is none" error={errors.sealNumber?.message} {...register("sealNumber")} />
        <Input label="Note" hint="Carrier and tracking number, for one" error={errors.note?.message} {...register("note")} />
      </div>
      <Note kind="caution" title="A board travels in a closed anti-static bag.">Keep the enclosure’s small board with its drive: it may hold the key to the data.</Note>
    </FormDialog>
  );
}
