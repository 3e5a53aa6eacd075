"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useForm } from "react-hook-form";
import { Checkbox } from "@/components/ui/checkbox";
import { FormDialog } from "@/components/ui/form-dialog";
import { Note } from "@/components/ui/note";
import { TextArea } from "@/components/ui/text-area";
import { useSay } from "@/components/ui/toast";
import { useChange } from "@/components/ui/use-change";
import { COMPOSITE_LIMIT } from "@/lib/core/composite";
import { readName } from "@/lib/core/words";
import { send } from "@/lib/http/send";
import type { ChipView, ReadView } from "@/lib/views";
import { candidates, candidateWords } from "./composite-words";
import { compositeForm, type CompositeFormInput, type CompositeFormOutput } from "./composite-form";

/** Which reads vote, and why. */
export function MakeCompositeForm({ chip, onChanged, onClose }: { chip: ChipView; onChanged(): Promise<unknown>; onClose(): void }) {
  const say = useSay();
  const { refusal, busy, attempt } = useChange();
  const reads = candidates(chip);
  const { register, handleSubmit, formState: { errors } } = useForm<CompositeFormInput, unknown, CompositeFormOutput>({
    resolver: zodResolver(compositeForm),
    defaultValues: { reads: reads.filter((r) => r.counted && r.sizeBytes === chip.sizeBytes).map((r) => String(r.number)), reason: "" },
  });
  const submit = handleSubmit(async (input) => {
    const done = await attempt(async () => {
      const made = await send<ReadView>("POST", `/api/chips/${chip.id}/composite`, input);
      await onChanged();
      say({ text: `${readName(made.stage, made.number)}, a composite, is stored. Look at its votes.` });
    });
    if (done) onClose();
  });
  return (
    <FormDialog onClose={onClose} title={`Make a composite of reads of ${chip.designator}`} action="Make the composite" busy={busy} refusal={refusal} onSubmit={() => void submit()}
      description="Each bit becomes what most of the reads say. The result is stored as a derived read; the reads that voted are set aside and kept.">
      <Note kind="caution" title="Three equal reads are better than any vote.">Re-seat the clip, lower the clock and read again while the chip can still be read. {COMPOSITE_LIMIT}</Note>
      <fieldset className="grid gap-1" aria-describedby={errors.reads ? "composite-reads" : undefined}>
        <legend className="pb-1 text-t2 font-semibold">Which reads vote?</legend>
        {reads.map((read) => <Checkbox key={read.id} value={read.number} label={<><b>{readName(read.stage, read.number)}</b> <span className="text-ink-2">{candidateWords(read, chip)}</span></>} {...register("reads")} />)}
        {errors.reads ? <span id="composite-reads" role="alert" className="text-t2 font-medium text-block">{errors.reads.message}</span> : null}
      </fieldset>
      <TextArea label="Why a composite?" hint="Such as why no more reads can be taken. Goes into the custody log as you type it." error={errors.reason?.message} {...register("reason")} />
      {chip.policy.twoPersonRule ? <p className="text-ink-2">Whoever makes the composite can’t approve it: another lead signs, with a written reason for each finding on it.</p> : null}
    </FormDialog>
  );
}
