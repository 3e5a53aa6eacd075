"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useForm } from "react-hook-form";
import { z } from "zod";
import { FormDialog } from "@/components/ui/form-dialog";
import { TextArea } from "@/components/ui/text-area";
import { useChange } from "@/components/ui/use-change";
import { send } from "@/lib/http/send";
import type { HandOverView } from "@/lib/views";
import { itemTitle, whereText } from "./item-words";

const form = z.object({ text: z.string().trim().max(500, "At most 500 characters.") });

/** The receiver confirms, or it is recorded that the item did not arrive. */
export function ConfirmForm({ item, handOver, received, onClose }: { item: string; handOver: HandOverView; received: boolean; onClose(): void }) {
  const router = useRouter();
  const { refusal, busy, attempt } = useChange();
  const { register, handleSubmit, formState: { errors } } = useForm({ resolver: zodResolver(form), defaultValues: { text: "" } });
  const submit = handleSubmit(async ({ text }) => {
    if (!(await attempt(() => send("POST", `/api/hand-overs/${handOver.id}/confirmation`, { received, text })))) return;
    router.refresh();
    onClose();
  });
  const outside = handOver.toUserId === null;
  return (
    <FormDialog onClose={onClose} title={received ? `Confirm having ${item}` : `${itemTitle(item)} did not arrive`} action={received ? "Confirm" : "Record that it did not arrive"} variant={received ? "lead" : "stop"}
      busy={busy} refusal={refusal} onSubmit={() => void submit()}
      description={received ? `From ${whereText(handOver.from)} to ${whereText(handOver.to)}. Condition as handed over: ${handOver.condition.replace(/[.;,]*$/, ".")}${handOver.sealNumber ? ` Seal ${handOver.sealNumber}.` : ""}` : `It stays with ${whereText(handOver.from)}.`}>
      <TextArea label={received ? (outside ? `How ${handOver.to.person} confirmed` : "Anything that is not as described") : "What happened"}
        hint={received && !outside ? "Leave empty when everything is as it says above. Goes into the custody log as you type it." : "Goes into the custody log as you type it."} error={errors.text?.message} {...register("text")} />
    </FormDialog>
  );
}
