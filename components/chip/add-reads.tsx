"use client";

import { useEffect, useRef, useState } from "react";
import { useForm, useWatch } from "react-hook-form";
import type { z } from "zod";
import { Input } from "@/components/ui/input";
import { Note } from "@/components/ui/note";
import { rulesFrom } from "@/components/ui/rules";
import { Select } from "@/components/ui/select";
import { TextArea } from "@/components/ui/text-area";
import { useSay } from "@/components/ui/toast";
import { countOf, sizeText } from "@/lib/core/quantity";
import { type Format, METHODS, type Stage } from "@/lib/core/words";
import type { ChipView } from "@/lib/views";
import { leavesNobody, METHOD_WORD, nameOf, namesOf, twins } from "./chip-words";
import { DropZone } from "./drop-zone";
import { equipmentKept, keepEquipment } from "./equipment";
import { type FileLook, heldBecause, lookAt, textAddress } from "./file-look";
import { FormatFields } from "./format-fields";
import { HeldFiles } from "./held-files";
import { clipCaution, contentsOf, fieldsToSend, FIELD_NAMES, likelyStage, numberTyped, seatingOptions, SUPPLY_OPTIONS, supplyWarning, type UploadFormValues } from "./upload-form";
import { UploadLine } from "./upload-line";
import type { uploadForm } from "./upload-rules";
import { useUploads } from "./use-uploads";
import { walkText } from "./walk-text";

const rules = rulesFrom(() => import("./upload-rules").then((m) => m.uploadForm));
const METHOD_OPTIONS = [{ value: "", label: "Not said" }, ...METHODS.map((m) => ({ value: m, label: METHOD_WORD[m] }))];
const HELD_OPTIONS = [{ value: "", label: "Not said" }, { value: "true", label: "Held in reset" }, { value: "false", label: "Not held" }];
const text = (value: unknown) => (typeof value === "string" ? value : value === undefined || value === null ? "" : String(value));

/** The drop zone with its list, and the form that says what is read and with what. */
export function AddReads({ chip, userId, donorAsked, onChanged }: {
  chip: ChipView;
  userId: string;
  /** how often the donor's own content was asked for from above */
  donorAsked: number;
  onChanged(): Promise<unknown>;
}) {
  const say = useSay();
  const contents = contentsOf(chip);
  const [held, setHeldShown] = useState<readonly FileLook[]>([]);
  // looking into a large text takes a moment: files dropped meanwhile must not push out what waits by then
  const waiting = useRef<readonly FileLook[]>([]);
  const setHeld = (looks: readonly FileLook[]) => {
    waiting.current = looks;
    setHeldShown(looks);
  };
  const [looking, setLooking] = useState(0);
  const [incomplete, setIncomplete] = useState(false);
  const first = likelyStage(chip, contents);
  const { register, setValue, setFocus, control, trigger, getValues, formState: { errors } } = useForm<z.input<typeof uploadForm>, unknown, z.output<typeof uploadForm>>({
    resolver: rules,
    defaultValues: { stage: first, seating: String(chip.nextSeating[first]), reader: "", method: "", toolVersion: "", adapter: "", supplyMillivolts: "", clockKilohertz: "", controllerHeld: "", note: "", format: "raw", base: "", size: String(contents.find((c) => c.stage === first)?.expectedBytes ?? ""), fill: "0xFF" },
  });
  useEffect(() => {
    for (const [name, value] of Object.entries(equipmentKept())) setValue(name as keyof UploadFormValues, value);
  }, [setValue]);

  function chooseStage(next: Stage) {
    setValue("seating", String(chip.nextSeating[next]));
    setValue("size", String(contents.find((c) => c.stage === next)?.expectedBytes ?? ""));
  }

  // After a transfer the next reads are read-backs: a form left on "Original" would file them under the wrong chip.
  const transfers = useRef(chip.transfers.length);
  useEffect(() => {
    if (transfers.current === chip.transfers.length) return;
    transfers.current = chip.transfers.length;
    setValue("stage", "after");
    setValue("seating", String(chip.nextSeating.after));
  }, [chip.transfers.length, chip.nextSeating.after, setValue]);

  const answered = useRef(donorAsked);
  useEffect(() => {
    if (answered.current === donorAsked) return;
    answered.current = donorAsked;
    setValue("stage", "donor");
    setValue("seating", String(chip.nextSeating.donor));
    setFocus("stage");
  }, [donorAsked, chip.nextSeating.donor, setValue, setFocus]);

  const stage = useWatch({ control, name: "stage" }) as Stage;
  const supply = text(useWatch({ control, name: "supplyMillivolts" }));
  const content = contents.find((c) => c.stage === stage) ?? contents[0];
  const [format, base, size] = useWatch({ control, name: ["format", "base", "size"] }).map(text) as [Format, string, string];
  const [from, length] = [numberTyped(base), numberTyped(size)];
  const frame = from === null || length === null ? null : { base: from, size: length };
  const given = held.flatMap((one) => (one.looks === format && one.addresses ? [one.addresses] : []));
  const warning = content ? supplyWarning(supply, content.supplyMillivolts, chip.designator) : null;

  const { queue, uploads } = useUploads((upload) => {
    void onChanged();
    if (!upload.read) return;
    const same = twins(upload.read, chip.reads).map((r) => r.number);
    say({ text: `${nameOf(upload.read)} is stored.${same.length > 0 ? ` It equals ${namesOf(upload.read.stage, same)}.` : ""}` });
  });

  // the form's rules may have to be fetched first: a second click meanwhile must not send a file twice
  const sent = useRef(new WeakSet<FileLook>());

  /** Sends these files as the form says; whatever can't go yet waits on the page. */
  async function sendAll(asked: readonly FileLook[]) {
    const complete = await trigger(undefined, { shouldFocus: true });
    setIncomplete(!complete);
    const looks = asked.filter((one) => !sent.current.has(one));
    if (!content || !complete) return setHeld(looks);
    for (const one of looks) sent.current.add(one);
    const values = getValues();
    const fields = fieldsToSend(Object.fromEntries(FIELD_NAMES.map((name) => [name, text(values[name]).trim()])) as UploadFormValues);
    keepEquipment(fields);
    queue.add(looks.map((one) => one.file), { chipId: content.chipId, words: content.words, expectedBytes: content.expectedBytes, imageBytes: format === "raw" ? null : numberTyped(fields.size), fields });
    setHeld([]);
  }

  async function take(files: File[]) {
    setLooking((n) => n + files.length);
    const fresh = await Promise.all(files.map((file) => lookAt(file, walkText)));
    setLooking((n) => n - files.length);
    const looks = [...waiting.current, ...fresh];
    // what a file looks like is a proposal: one that isn't what the form says waits for a person
    if (looks.some((one) => heldBecause(one, format, frame) !== null)) setHeld(looks);
    else await sendAll(looks);
  }

  if (!content) return null;
  const sizes = sizeText(content.expectedBytes);
  return (
    <div className="grid grid-cols-[minmax(0,1fr)_352px] gap-8 mid:grid-cols-[minmax(0,1fr)_300px] narrow:grid-cols-[minmax(0,1fr)] narrow:gap-y-[22px]">
      <div className="grid content-start gap-3">
        <Note kind="caution" title={`Before you clip on: ${content.words}`}>{clipCaution(stage)}</Note>
        {stage === "before" && leavesNobody(chip, userId) ? <Note kind="caution" title={`You are the only one who could approve the image of ${chip.designator}.`}>Once you have taken a read of it you can’t, and nothing can be written. Let somebody else read it. Where somebody works alone, an admin may switch the two-person rule off under Policy.</Note> : null}
        <DropZone title="Drop chip images here" onFiles={(files) => void take(files)}>Raw binary, {sizes} each, or a text of records (Intel HEX, S-record). Several files at once are fine; they share what the form says.</DropZone>
        {looking > 0 ? <p role="status" className="text-t2 text-ink-2">Looking into {countOf(looking, "file")}.</p> : null}
        <HeldFiles held={held} format={format} window={frame} incomplete={incomplete} onFormat={(value) => setValue("format", value, { shouldValidate: true })}
          onSend={() => void sendAll(held)} onDrop={() => { setHeld([]); setIncomplete(false); }} />
        <ul aria-label="Files">{uploads.map((upload) => <UploadLine key={upload.key} upload={upload} queue={queue} chip={chip} />)}</ul>
      </div>
      <form className="grid content-start gap-3.5 narrow:grid-cols-2 narrow:gap-x-5 phone:grid-cols-1" onSubmit={(event) => { event.preventDefault(); if (held.length > 0) void sendAll(held); }}>
        <Select label="Which content is it?" options={contents.map((c) => ({ value: c.stage, label: c.words }))} error={errors.stage?.message}
          {...register("stage", { onChange: (event: { target: { value: string } }) => chooseStage(event.target.value as Stage) })} />
        <Select label="Seating" options={seatingOptions(chip, stage)} hint="One seating is one time the clip or chip was put on. A new one counts more than another read in the old one." error={errors.seating?.message} {...register("seating")} />
        <Input label="Reader" placeholder="R2" hint="The device that read it, as you name it" autoComplete="off" error={errors.reader?.message} {...register("reader")} />
        <Input label="Adapter" placeholder="SOIC-8 clip C4" autoComplete="off" error={errors.adapter?.message} {...register("adapter")} />
        <Select label="Supply set in the reader" options={SUPPLY_OPTIONS} error={errors.supplyMillivolts?.message} {...register("supplyMillivolts")} />
        {warning ? <Note kind="caution" role="status">{warning}</Note> : null}
        <FormatFields format={format} register={register} errors={errors} typed={{ base, size }} onBase={(value) => setValue("base", textAddress(value), { shouldValidate: true })}
          addresses={given.length > 0 ? { first: Math.min(...given.map((one) => one.first)), last: Math.max(...given.map((one) => one.last)) } : null} />
        <details className="narrow:col-span-full border-t border-rule pt-2">
          <summary className="cursor-pointer py-1 font-semibold">More about this read</summary>
          <div className="grid gap-3.5 pt-2 narrow:grid-cols-2 narrow:gap-x-5 phone:grid-cols-1">
            <Select label="Method" options={METHOD_OPTIONS} error={errors.method?.message} {...register("method")} />
            <Input label="Tool version" autoComplete="off" error={errors.toolVersion?.message} {...register("toolVersion")} />
            <Input label="Clock, kHz" inputMode="numeric" autoComplete="off" error={errors.clockKilohertz?.message} {...register("clockKilohertz")} />
            <Select label="Main controller during the read" options={HELD_OPTIONS} error={errors.controllerHeld?.message} {...register("controllerHeld")} />
            <TextArea label="Note" error={errors.note?.message} {...register("note")} />
          </div>
        </details>
      </form>
    </div>
  );
}
