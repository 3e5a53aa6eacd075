"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useState } from "react";
import { useForm, useWatch } from "react-hook-form";
import { Button } from "@/components/ui/button";
import { FormBody } from "@/components/ui/form-dialog";
import { Note } from "@/components/ui/note";
import { useChange } from "@/components/ui/use-change";
import { proposedOriginal } from "@/lib/core/two-chips";
import { type Bus, BUSES } from "@/lib/core/words";
import { send } from "@/lib/http/send";
import type { BoardView, DriveView } from "@/lib/views";
import { ChipFields } from "./chip-fields";
import { chipForm, type ChipFormInput, type ChipFormOutput } from "./chip-form";
import { originalOf } from "./drive-words";
import { goOnWords } from "./flow";
import type { StepGiven } from "./flow-given";
import { keepUsed, lastUsed } from "./last-used";

/** How a form ends: closed, on to what the drive needs next, or again for another chip of the same board. */
export type ChipEnd = "close" | "go-on" | "another";

const typed = (value: unknown) => (typeof value === "string" || typeof value === "number" ? String(value) : "");
const busOf = (text: string | undefined): Bus => BUSES.find((bus) => bus === text) ?? "spi";

export function ChipStep({ drive, board, userId, onClose, onSaved }: StepGiven & { drive: DriveView; board: BoardView; onSaved(end: ChipEnd): Promise<void> }) {
  const { refusal, busy, attempt } = useChange();
  const [used] = useState(() => lastUsed(userId));
  const originals = originalOf(drive)?.chips ?? [];
  const original = board.role === "original";
  // a donor that fits carries the same chip: the first original without a pair is what comes next
  const twin = original ? null : originals.find((chip) => !chip.pair) ?? null;
  const { register, handleSubmit, setValue, getFieldState, control, formState: { errors } } = useForm<ChipFormInput, unknown, ChipFormOutput>({
    resolver: zodResolver(chipForm),
    defaultValues: {
      designator: twin?.designator ?? "", bus: twin?.bus ?? busOf(used.bus?.[0]), sizeBytes: twin ? String(twin.sizeBytes) : "", sizeSource: "marking",
      supplyMillivolts: "", package: twin?.package ?? (original ? used.package?.[0] ?? "" : ""), marking: "", holds: twin?.holds ?? "", idBytes: "", sfdp: "", needsTransfer: !board.dataInController, pairedWith: twin?.id ?? "",
    },
  });
  const [size, supply, marking, idBytes, sfdp, pairedWith, designator] = useWatch({ control, name: ["sizeBytes", "supplyMillivolts", "marking", "idBytes", "sfdp", "pairedWith", "designator"] }).map(typed);
  const needsTransfer = useWatch({ control, name: "needsTransfer" }) === true;
  const replaced = originals.find((chip) => chip.id === pairedWith)?.pair ?? null;
  const goOn = goOnWords({ kind: "chip", boardId: board.id }, drive, { needsTransfer });
  const save = (end: ChipEnd) => handleSubmit((input) => attempt(async () => {
    const { pairedWith: pair, ...rest } = input;
    await send("POST", `/api/boards/${board.id}/chips`, pair ? { ...rest, pairedWith: pair } : rest);
    keepUsed(userId, input);
    await onSaved(end);
  }).then(() => undefined))();
  // the same name on both boards is the pair to begin with; a choice made by hand stays
  const onDesignator = (name: string) => {
    const equal = original || getFieldState("pairedWith").isDirty ? null : proposedOriginal(name, originals);
    if (equal) setValue("pairedWith", equal.id);
  };
  return (
    <FormBody onClose={onClose} action={goOn ?? "Add the chip"} busy={busy} refusal={refusal} onSubmit={() => void save(goOn ? "go-on" : "close")}
      also={(
        <>
          {original ? <Button disabled={busy} onClick={() => void save("another")}>Save and add another chip</Button> : null}
          {goOn ? <Button disabled={busy} onClick={() => void save("close")}>Add the chip</Button> : null}
        </>
      )}>
      <ChipFields board={board} originals={originals} register={register} errors={errors} typed={{ size, supply, marking, idBytes, sfdp, designator, pairedWith }} used={used} onDesignator={onDesignator}
        onTakeSize={({ bytes, source }) => {
          setValue("sizeBytes", String(bytes), { shouldValidate: true });
          setValue("sizeSource", source);
        }} />
      {replaced ? <Note kind="caution" title={`The pair with ${replaced.designator} on ${replaced.boardNumber} ends.`}>An approval for it falls.</Note> : null}
      {original ? <Note kind="caution" title="Take power away before clipping, and never write to this chip.">Never heat it before agreed reads exist.</Note> : null}
    </FormBody>
  );
}
