"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useForm, useWatch } from "react-hook-form";
import type { z } from "zod";
import { Checkbox } from "@/components/ui/checkbox";
import { FormDialog } from "@/components/ui/form-dialog";
import { Note } from "@/components/ui/note";
import { TextArea } from "@/components/ui/text-area";
import { useSay } from "@/components/ui/toast";
import { useChange } from "@/components/ui/use-change";
import { closeRefusal, openPoints } from "@/lib/core/closing";
import { CLOSED_KINDS, type ClosedKind } from "@/lib/core/words";
import { send } from "@/lib/http/send";
import { type ClosingInput, closingInput } from "@/lib/schemas/closing";
import type { ClosingView } from "@/lib/views";
import { KIND_WORDS } from "./closing-words";

/** Filled in where a drive never had a chip to move. */
const NO_CHIP_REASON = "There was no chip to move: the drive’s own data lies inside its main controller.";

export function CloseForm({ caseId, caseRef, closing, onClose }: { caseId: string; caseRef: string; closing: ClosingView; onClose(): void }) {
  const router = useRouter();
  const say = useSay();
  const { refusal, busy, attempt } = useChange();
  const { facts } = closing;
  const nothing = closing.drives.length > 0 && closing.drives.every((drive) => drive.noChip);
  const first: ClosedKind = facts.returned && !nothing ? "returned" : facts.received ? "without-transfer" : "cancelled";
  const { register, handleSubmit, setError, control, formState: { errors } } = useForm<z.input<typeof closingInput>, unknown, ClosingInput>({ resolver: zodResolver(closingInput), defaultValues: { kind: first, reason: nothing ? NO_CHIP_REASON : "" } });
  const kind = useWatch({ control, name: "kind" });
  const open = openPoints(facts, kind);
  const submit = handleSubmit(async (input) => {
    if (closeRefusal(facts, input.kind, input.reason ?? null) && open.length > 0 && !input.reason) return setError("reason", { message: "Write the reason for closing it all the same." });
    if (!(await attempt(() => send("POST", `/api/cases/${caseId}/closing`, input)))) return;
    say({ text: `Case ${caseRef} is closed.` });
    router.refresh();
    onClose();
  });
  return (
    <FormDialog onClose={onClose} title={`Release and close case ${caseRef}`} action="Close the case" busy={busy} refusal={refusal} onSubmit={() => void submit()}
      reason={kind === "returned" ? closeRefusal({ ...facts, chips: [], otherSerial: [] }, kind, null) : null}
      description="It leaves the bench and takes no change until a lead reopens it. Images, bundles, summaries and notes stay possible.">
      <fieldset className="grid gap-1.5">
        <legend className="mb-1 text-t2 font-semibold">How does it end?</legend>
        {CLOSED_KINDS.map((one) => <Checkbox key={one} type="radio" value={one} label={<><b>{KIND_WORDS[one].label}.</b> {KIND_WORDS[one].means}</>} {...register("kind")} />)}
      </fieldset>
      {open.length > 0 ? <Note kind="caution" title="This needs your reason."><ul>{open.map((point) => <li key={point}>{point}</li>)}</ul></Note> : null}
      <TextArea label={open.length > 0 ? "Reason" : "Reason or remark"} hint={open.length > 0 ? "Goes into the log of every drive as you type it." : "Only where something has to be said. Goes into the log of every drive."} error={errors.reason?.message} {...register("reason")} />
      <p className="text-t2 text-ink-2">Its images fall due for erasure {closing.keepDays} days after {closing.returned ? "the return" : "today"}, as the customer was told.</p>
    </FormDialog>
  );
}
