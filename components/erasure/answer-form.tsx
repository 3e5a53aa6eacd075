"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useForm } from "react-hook-form";
import { FormDialog } from "@/components/ui/form-dialog";
import { TextArea } from "@/components/ui/text-area";
import { useSay } from "@/components/ui/toast";
import { useChange } from "@/components/ui/use-change";
import { send } from "@/lib/http/send";
import { type DeletionAnswerInput, deletionAnswerInput } from "@/lib/schemas/erasure";

export function AnswerForm({ requestId, email, onClose }: { requestId: string; email: string; onClose(): void }) {
  const router = useRouter();
  const say = useSay();
  const { refusal, busy, attempt } = useChange();
  const { register, handleSubmit, formState: { errors } } = useForm<DeletionAnswerInput>({ resolver: zodResolver(deletionAnswerInput), defaultValues: { answer: "" } });
  const submit = handleSubmit(async (input) => {
    if (!(await attempt(() => send("POST", `/api/requests/${requestId}/deletion-answer`, input)))) return;
    say({ text: "The answer is on its way to the customer." });
    router.refresh();
    onClose();
  });
  return (
    <FormDialog onClose={onClose} title="Answer why not yet" action="Send the answer" busy={busy} refusal={refusal} onSubmit={() => void submit()}
      description={`It goes to ${email}, stands on the customer’s private page and in the log. The wish stays on record, so that the images can be erased later because of it.`}>
      <TextArea label="Answer" hint="What has to be kept, why, and until when. Write no name: the log keeps it." rows={5} error={errors.answer?.message} {...register("answer")} />
    </FormDialog>
  );
}
