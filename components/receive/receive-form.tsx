"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { type Control, type UseFormRegister, useForm, useWatch } from "react-hook-form";
import type { z } from "zod";
import { Button, ButtonLink, Buttons } from "@/components/ui/button";
import { Input } from "@/components/ui/input";
import { Note } from "@/components/ui/note";
import { TextArea } from "@/components/ui/text-area";
import { dueText } from "@/components/ui/times";
import { useChange } from "@/components/ui/use-change";
import { send } from "@/lib/http/send";
import { type ReceiptInput, receiptInput } from "@/lib/schemas/receipt";
import type { ParcelView } from "@/lib/views";
import { Choice } from "./choice";
import { enclosureWords, type ParcelLine, parcelLines } from "./parcel-lines";

type Form = z.input<typeof receiptInput>;
/** Nothing is chosen until somebody has looked: the schema refuses an empty choice with its own sentence. */
const UNSEEN = null as unknown as "yes";
const LINE = { yes: "as sent", no: "not so", none: "not there" };

function Compared({ line, at, register, control, error, textError }: { line: ParcelLine; at: number; register: UseFormRegister<Form>; control: Control<Form>; error?: string; textError?: string }) {
  const asSent = useWatch({ control, name: `lines.${at}.asSent` });
  return (
    <li className="grid grid-cols-[minmax(0,1fr)_auto] items-start gap-x-6 gap-y-1 border-b border-rule py-2.5 phone:grid-cols-[minmax(0,1fr)]">
      <div className="min-w-0"><span className="block text-t1 text-ink-2">{line.what}</span><span className="font-mono font-semibold break-words">{line.asked}</span></div>
      <Choice legend={`${line.what}: ${line.asked}`} quiet words={LINE} register={register(`lines.${at}.asSent`)} error={error} />
      {asSent === "no" || asSent === "none" ? <Input className="col-span-full max-w-[560px]" label={asSent === "no" ? "What is there instead" : "Anything to add"} mono={asSent === "no"} autoComplete="off" error={textError} {...register(`lines.${at}.text`)} /> : null}
    </li>
  );
}

/** The parcel beside its request. Leave it and nothing is stored; record it and the drive comes next. */
export function ReceiveForm({ parcel }: { parcel: ParcelView }) {
  const router = useRouter();
  const lines = parcelLines(parcel);
  const { refusal, busy, attempt } = useChange();
  const { register, control, handleSubmit, setValue, formState: { errors, isSubmitSuccessful } } = useForm<Form, unknown, ReceiptInput>({
    resolver: zodResolver(receiptInput),
    defaultValues: { lines: lines.map(({ what }) => ({ what, asSent: UNSEEN, text: "" })), sealAsSent: UNSEEN, sealNumber: "", smallBoard: UNSEEN, carrier: "", tracking: "", parcelCondition: "", accessories: "", differs: "", dueOn: parcel.dueOn ?? parcel.neededBy ?? "" },
  });
  const submit = handleSubmit(async (input) => {
    // beside a line that is as sent nothing is to be said, whatever was typed before
    const said = { ...input, lines: input.lines?.map((line) => (line.asSent === "yes" ? { ...line, text: null } : line)) };
    if (await attempt(() => send("POST", `/api/cases/${parcel.caseId}/receipt`, said))) router.refresh();
  });
  const enclosure = enclosureWords(parcel.enclosure);
  return (
    <form noValidate onSubmit={submit} className="grid max-w-[860px] gap-6">
      {lines.length > 0 ? (
        <section aria-labelledby="beside">
          <div className="flex flex-wrap items-baseline justify-between gap-x-6 gap-y-2 border-b border-rule-2 pb-2">
            <h2 id="beside" className="text-t4 font-bold">The request beside what is in the parcel</h2>
            <Button size="small" onClick={() => { for (const at of lines.keys()) setValue(`lines.${at}.asSent`, "yes", { shouldValidate: true }); }}>All lines are as sent</Button>
          </div>
          <ul>{lines.map((line, at) => <Compared key={line.what} line={line} at={at} register={register} control={control} error={errors.lines?.[at]?.asSent?.message} textError={errors.lines?.[at]?.text?.message} />)}</ul>
        </section>
      ) : null}
      <div className="grid grid-cols-2 gap-x-6 gap-y-5 phone:grid-cols-1">
        <Choice legend="Is the seal as it was sent?" words={{ yes: "as sent", no: "not so", none: "no seal" }} register={register("sealAsSent")} error={errors.sealAsSent?.message} />
        <Input label="Number of the seal" mono autoComplete="off" hint="As it stands on the seal itself" error={errors.sealNumber?.message} {...register("sealNumber")} />
        <div className="col-span-full grid gap-1">
          <Choice legend="Is the enclosure here, with its small board?" words={{ yes: "here", no: "not here", none: "the drive has none" }} register={register("smallBoard")} error={errors.smallBoard?.message} />
          <span className="text-t2 text-ink-2">It may hold the key to the data: keep it with the drive.{enclosure ? ` The customer said: “${enclosure}”.` : ""}</span>
        </div>
        <Input label="Carrier" autoComplete="off" hint="Leave empty when it was brought in person" error={errors.carrier?.message} {...register("carrier")} />
        <Input label="Tracking number" mono autoComplete="off" error={errors.tracking?.message} {...register("tracking")} />
        <TextArea className="col-span-full" label="Condition of the parcel" rows={2} hint="Box, padding, anti-static bag, anything loose or bent. Leave names out: this goes into the log." error={errors.parcelCondition?.message} {...register("parcelCondition")} />
        <Input label="What else came" autoComplete="off" hint="Cables, adapter, screws, other drives" error={errors.accessories?.message} {...register("accessories")} />
        <Input label="Due date" type="date" hint={parcel.neededBy ? `The customer needs it by ${dueText(parcel.neededBy)}. Change it to what you can keep.` : "Leave empty when none was agreed"} error={errors.dueOn?.message} {...register("dueOn")} />
        <Input label="What else is different" autoComplete="off" hint="From what the request says" error={errors.differs?.message} {...register("differs")} />
      </div>
      {refusal ? <Note kind="block" role="alert" title="The parcel was not received.">{refusal}</Note> : null}
      <Buttons>
        <Button type="submit" variant="lead" disabled={busy || (isSubmitSuccessful && !refusal)}>{parcel.receivedAt ? "Record the receipt" : "Receive the parcel"}</Button>
        <ButtonLink href="/receive">Leave it</ButtonLink>
      </Buttons>
    </form>
  );
}
