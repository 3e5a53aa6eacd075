"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useForm } from "react-hook-form";
import { z } from "zod";
import { Checkbox } from "@/components/ui/checkbox";
import { FormDialog } from "@/components/ui/form-dialog";
import { Input } from "@/components/ui/input";
import { Note } from "@/components/ui/note";
import { TextArea } from "@/components/ui/text-area";
import { useSay } from "@/components/ui/toast";
import { useChange } from "@/components/ui/use-change";
import { send } from "@/lib/http/send";
import { returnInput } from "@/lib/schemas/closing";
import type { ClosingView } from "@/lib/views";

const NOTHING = "Tick at least one thing that goes back, or write it in a line of its own.";
const form = z.strictObject({ ...returnInput.shape, items: z.array(z.string()).or(z.literal(false)), more: z.string() });
type Form = z.input<typeof form>;

export function ReturnForm({ caseId, closing, onClose }: { caseId: string; closing: ClosingView; onClose(): void }) {
  const router = useRouter();
  const say = useSay();
  const { refusal, busy, attempt } = useChange();
  const { register, handleSubmit, setError, formState: { errors } } = useForm<Form, unknown, z.output<typeof form>>({
    resolver: zodResolver(form), defaultValues: { items: closing.items, more: "", toPerson: closing.customerName, carrier: "", tracking: "", sealNumber: "", note: "" },
  });
  const submit = handleSubmit(async ({ items, more, ...rest }) => {
    const all = [...(items || []), ...more.split("\n").map((line) => line.trim()).filter(Boolean)];
    if (all.length === 0) return setError("more", { message: NOTHING });
    if (!(await attempt(() => send("POST", `/api/cases/${caseId}/return`, { ...rest, items: all })))) return;
    say({ text: "The return is recorded. The mail to the customer is on its way." });
    router.refresh();
    onClose();
  });
  return (
    <FormDialog onClose={onClose} title="Record the return" action="Record the return" busy={busy} refusal={refusal} onSubmit={() => void submit()}
      description="Once a case, when the parcel is packed. It goes into the log of every drive, and the customer gets a mail that lists it.">
      <fieldset className="grid gap-1">
        <legend className="mb-1 text-t2 font-semibold">What goes back?</legend>
        {closing.items.map((item) => <Checkbox key={item} value={item} label={<span className="[overflow-wrap:anywhere]">{item}</span>} {...register("items")} />)}
      </fieldset>
      <TextArea label="And also" rows={2} hint="One thing a line" error={errors.more?.message} {...register("more")} />
      <div className="grid grid-cols-2 gap-4 slim:grid-cols-1">
        <Input label="To whom" error={errors.toPerson?.message} {...register("toPerson")} />
        <Input label="Carrier" hint="Leave empty when it is handed over here" error={errors.carrier?.message} {...register("carrier")} />
        <Input label="Tracking number" mono error={errors.tracking?.message} {...register("tracking")} />
        <Input label="Number of its seal" mono error={errors.sealNumber?.message} {...register("sealNumber")} />
        <TextArea label="Note" className="col-span-full" error={errors.note?.message} {...register("note")} />
      </div>
      <Note kind="caution" title="Boards travel in closed anti-static bags.">The enclosure’s small board goes back with its drive: it may hold the key to the data.</Note>
    </FormDialog>
  );
}
