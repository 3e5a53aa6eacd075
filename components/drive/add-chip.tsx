"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useState } from "react";
import { useForm, useWatch } from "react-hook-form";
import { Button } from "@/components/ui/button";
import { FormDialog } from "@/components/ui/form-dialog";
import { Note } from "@/components/ui/note";
import { useChange } from "@/components/ui/use-change";
import { send } from "@/lib/http/send";
import type { BoardView, ChipSummary } from "@/lib/views";
import { ChipFields } from "./chip-fields";
import { chipForm, type ChipFormInput, type ChipFormOutput } from "./chip-form";
import { boardName } from "@/lib/core/board-name";

interface Given {
  board: BoardView;
  originals: readonly ChipSummary[];
}

const typed = (value: unknown) => (typeof value === "string" || typeof value === "number" ? String(value) : "");

function AddChipForm({ board, originals, onClose }: Given & { onClose(): void }) {
  const router = useRouter();
  const { refusal, busy, attempt } = useChange();
  // a donor that fits carries the same chip: the first original without a pair is what comes next
  const twin = board.role === "donor" ? originals.find((chip) => !chip.pair) ?? null : null;
  const { register, handleSubmit, setValue, control, formState: { errors } } = useForm<ChipFormInput, unknown, ChipFormOutput>({
    resolver: zodResolver(chipForm),
    defaultValues: {
      designator: twin?.designator ?? "", bus: twin?.bus ?? "spi", sizeBytes: twin ? String(twin.sizeBytes) : "", sizeSource: "marking",
      supplyMillivolts: "", package: twin?.package ?? "", marking: "", holds: twin?.holds ?? "", idBytes: "", sfdp: "", needsTransfer: true, pairedWith: twin?.id ?? "",
    },
  });
  const [size, supply, marking, idBytes, sfdp, pairedWith] = useWatch({ control, name: ["sizeBytes", "supplyMillivolts", "marking", "idBytes", "sfdp", "pairedWith"] }).map(typed);
  const replaced = originals.find((chip) => chip.id === pairedWith)?.pair ?? null;
  const submit = handleSubmit(async ({ pairedWith: pair, ...input }) => {
    if (!(await attempt(() => send("POST", `/api/boards/${board.id}/chips`, pair ? { ...input, pairedWith: pair } : input)))) return;
    router.refresh();
    onClose();
  });
  return (
    <FormDialog onClose={onClose} title={`Add a chip on ${board.role === "original" ? "the original" : "the donor"} ${boardName(board)}`} action="Add the chip" busy={busy} refusal={refusal} onSubmit={() => void submit()}>
      <ChipFields role={board.role} originals={originals} register={register} errors={errors} typed={{ size, supply, marking, idBytes, sfdp }}
        onTakeSize={({ bytes, source }) => {
          setValue("sizeBytes", String(bytes), { shouldValidate: true });
          setValue("sizeSource", source);
        }} />
      {replaced ? <Note kind="caution" title={`The pair with ${replaced.designator} on ${replaced.boardNumber} ends.`}>An approval for it falls.</Note> : null}
      {board.role === "original" ? <Note kind="caution" title="Take power away before clipping, and never write to this chip.">Never heat it before agreed reads exist.</Note> : null}
    </FormDialog>
  );
}

export function AddChip({ lead, ...given }: Given & { lead?: boolean }) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button variant={lead ? "lead" : "plain"} size={lead ? "normal" : "small"} onClick={() => setOpen(true)}>Add a chip…</Button>
      {open ? <AddChipForm {...given} onClose={() => setOpen(false)} /> : null}
    </>
  );
}
