"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useEffect, useRef, useState } from "react";
import { useForm, useWatch } from "react-hook-form";
import type { z } from "zod";
import { Input } from "@/components/ui/input";
import { Note } from "@/components/ui/note";
import { Select } from "@/components/ui/select";
import { TextArea } from "@/components/ui/text-area";
import { useSay } from "@/components/ui/toast";
import { listText, sizeText } from "@/lib/core/quantity";
import { METHODS, type Stage } from "@/lib/core/words";
import type { ChipView } from "@/lib/views";
import { METHOD_WORD, nameOf, namesOf, twins } from "./chip-words";
import { DropZone } from "./drop-zone";
import { equipmentKept, keepEquipment } from "./equipment";
import { clipCaution, contentsOf, FIELD_NAMES, likelyStage, seatingOptions, SUPPLY_OPTIONS, supplyWarning, uploadForm, type UploadFormValues } from "./upload-form";
import { UploadLine } from "./upload-line";
import { useUploads } from "./use-uploads";

const METHOD_OPTIONS = [{ value: "", label: "Not said" }, ...METHODS.map((m) => ({ value: m, label: METHOD_WORD[m] }))];
const HELD_OPTIONS = [{ value: "", label: "Not said" }, { value: "true", label: "Held in reset" }, { value: "false", label: "Not held" }];
const text = (value: unknown) => (typeof value === "string" ? value : value === undefined || value === null ? "" : String(value));

/** The drop zone with its list, and the form that says what is read and with what. */
export function AddReads({ chip, onChanged }: { chip: ChipView; onChanged(): Promise<unknown> }) {
  const say = useSay();
  const contents = contentsOf(chip);
  const [held, setHeld] = useState<File[]>([]);
  const first = likelyStage(chip, contents);
  const { register, setValue, control, trigger, getValues, formState: { errors } } = useForm<z.input<typeof uploadForm>, unknown, z.output<typeof uploadForm>>({
    resolver: zodResolver(uploadForm),
    defaultValues: { stage: first, seating: String(chip.nextSeating[first]), reader: "", method: "", toolVersion: "", adapter: "", supplyMillivolts: "", clockKilohertz: "", controllerHeld: "", note: "" },
  });
  useEffect(() => {
    for (const [name, value] of Object.entries(equipmentKept())) setValue(name as keyof UploadFormValues, value);
  }, [setValue]);

  // After a transfer the next reads are read-backs: a form left on "Original" would file them under the wrong chip.
  const transfers = useRef(chip.transfers.length);
  useEffect(() => {
    if (transfers.current === chip.transfers.length) return;
    transfers.current = chip.transfers.length;
    setValue("stage", "after");
    setValue("seating", String(chip.nextSeating.after));
  }, [chip.transfers.length, chip.nextSeating.after, setValue]);

  const stage = useWatch({ control, name: "stage" }) as Stage;
  const supply = text(useWatch({ control, name: "supplyMillivolts" }));
  const content = contents.find((c) => c.stage === stage) ?? contents[0];
  const warning = content ? supplyWarning(supply, content.supplyMillivolts, chip.designator) : null;

  const { queue, uploads } = useUploads((upload) => {
    void onChanged();
    if (!upload.read) return;
    const same = twins(upload.read, chip.reads).map((r) => r.number);
    say({ text: `${nameOf(upload.read)} is stored.${same.length > 0 ? ` It equals ${namesOf(upload.read.stage, same)}.` : ""}` });
  });

  async function take(files: File[]) {
    if (!content || !(await trigger(undefined, { shouldFocus: true }))) {
      setHeld((before) => [...before, ...files]);
      return;
    }
    const values = getValues();
    const fields = Object.fromEntries(FIELD_NAMES.map((name) => [name, text(values[name]).trim()])) as UploadFormValues;
    keepEquipment(fields);
    queue.add([...held, ...files], { chipId: content.chipId, words: content.words, expectedBytes: content.expectedBytes, fields });
    setHeld([]);
  }

  if (!content) return null;
  const sizes = sizeText(content.expectedBytes);
  return (
    <div className="grid grid-cols-[minmax(0,1fr)_352px] gap-8 mid:grid-cols-[minmax(0,1fr)_300px] narrow:grid-cols-[minmax(0,1fr)] narrow:gap-y-[22px]">
      <div className="grid content-start gap-3">
        <Note kind="caution" title={`Before you clip on: ${content.words}`}>{clipCaution(stage)}</Note>
        <DropZone title="Drop chip images here" onFiles={(files) => void take(files)}>Raw binary, {sizes} each. Several files at once are fine; they share what the form says.</DropZone>
        {held.length > 0 ? (
          <Note kind="note" title={`${listText(held.map((file) => file.name))} ${held.length === 1 ? "waits" : "wait"}.`} role="status">
            Complete the form, then send. <button type="button" className="font-semibold text-green underline" onClick={() => void take([])}>Send now</button>{" "}
            <button type="button" className="font-semibold text-green underline" onClick={() => setHeld([])}>Take off the list</button>
          </Note>
        ) : null}
        <ul aria-label="Files">{uploads.map((upload) => <UploadLine key={upload.key} upload={upload} queue={queue} chip={chip} />)}</ul>
      </div>
      <form className="grid content-start gap-3.5 narrow:grid-cols-2 narrow:gap-x-5 phone:grid-cols-1" onSubmit={(event) => { event.preventDefault(); if (held.length > 0) void take([]); }}>
        <Select label="Which content is it?" options={contents.map((c) => ({ value: c.stage, label: c.words }))} error={errors.stage?.message}
          {...register("stage", { onChange: (event: { target: { value: string } }) => setValue("seating", String(chip.nextSeating[event.target.value as Stage])) })} />
        <Select label="Seating" options={seatingOptions(chip, stage)} hint="A new seating counts more than another read in the old one." error={errors.seating?.message} {...register("seating")} />
        <Input label="Reader" placeholder="R2" autoComplete="off" error={errors.reader?.message} {...register("reader")} />
        <Input label="Adapter" placeholder="SOIC-8 clip C4" autoComplete="off" error={errors.adapter?.message} {...register("adapter")} />
        <Select label="Supply set in the reader" options={SUPPLY_OPTIONS} error={errors.supplyMillivolts?.message} {...register("supplyMillivolts")} />
        {warning ? <Note kind="caution" role="status">{warning}</Note> : null}
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
