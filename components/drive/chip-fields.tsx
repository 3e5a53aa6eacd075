import { useId } from "react";
import type { RegisterOptions, UseFormRegisterReturn } from "react-hook-form";
import { Checkbox } from "@/components/ui/checkbox";
import { Input } from "@/components/ui/input";
import { Note } from "@/components/ui/note";
import { Select } from "@/components/ui/select";
import { nameHelp } from "@/lib/core/name-digits";
import { crossing } from "@/lib/core/two-chips";
import type { BoardView, ChipSummary } from "@/lib/views";
import type { ChipField } from "./chip-form";
import { ChipAnswers } from "./chip-answers";
import type { SizeProposal } from "./chip-says";
import { BUS_OPTIONS, SIZE_SOURCE_OPTIONS } from "./drive-words";
import type { LastUsed, Proposed } from "./last-used";
import { listOf, Proposals } from "./proposals";
import { sizeHint, sizeNote } from "./size-words";

const NAMES: readonly Proposed[] = ["package", "marking", "holds"];

const VOLTS: readonly { value: string; label: string }[] = [
  { value: "", label: "Choose the supply" }, { value: "1200", label: "1.2 V" }, { value: "1800", label: "1.8 V" }, { value: "2500", label: "2.5 V" },
  { value: "3000", label: "3 V" }, { value: "3300", label: "3.3 V" }, { value: "5000", label: "5 V" }, { value: "unknown", label: "Unknown" },
];

/** The choices, and a recorded value that is none of them. */
function voltOptions(chosen: string) {
  return VOLTS.some((option) => option.value === chosen) || !/^\d+$/.test(chosen) ? VOLTS : [...VOLTS, { value: chosen, label: `${Number(chosen) / 1000} V` }];
}

export function ChipFields({ board, originals, register, errors, typed, used = {}, onDesignator, onTakeSize }: {
  board: Pick<BoardView, "role" | "dataInController">;
  /** chips of the original board that a donor's chip can be paired with */
  originals: readonly ChipSummary[];
  register(name: ChipField, options?: Pick<RegisterOptions, "onChange">): UseFormRegisterReturn;
  errors: Partial<Record<ChipField, { message?: string }>>;
  /** as typed so far */
  typed: { size: string; supply: string; marking: string; idBytes: string; sfdp: string; designator: string; pairedWith: string };
  /** what this person used last */
  used?: LastUsed;
  onDesignator?(name: string): void;
  onTakeSize(proposal: SizeProposal): void;
}) {
  const id = useId();
  const { size, supply } = typed;
  const { role } = board;
  const crossed = role === "donor" ? crossing(typed.designator, originals.find((chip) => chip.id === typed.pairedWith) ?? null, originals) : null;
  const note = sizeNote(size);
  // never filled in by itself: the same digits count Mbit in one family and Kbit in another
  const named = nameHelp(typed.marking);
  return (
    <>
      <div className="grid grid-cols-2 gap-4 slim:grid-cols-1">
        <Input label="Designator" mono hint="Printed beside the chip, such as U12" autoComplete="off" error={errors.designator?.message} {...register("designator", { onChange: (event: { target: { value: string } }) => onDesignator?.(event.target.value) })} />
        <Select label="Bus" options={BUS_OPTIONS} error={errors.bus?.message} {...register("bus")} />
        <Input label="Size" mono hint={<>{sizeHint(size)}{named ? <span className="mt-1 block">{named}</span> : null}</>} error={errors.sizeBytes?.message} {...register("sizeBytes")} />
        <Select label="The size comes from" options={SIZE_SOURCE_OPTIONS} error={errors.sizeSource?.message} {...register("sizeSource")} />
        <Select label="Supply" options={voltOptions(supply)} hint="1.8 V chips are destroyed by 3.3 V or 5 V" error={errors.supplyMillivolts?.message} {...register("supplyMillivolts")} />
        <Input label="Package" hint="Such as SOIC-8" list={listOf(used, id, "package")} error={errors.package?.message} {...register("package")} />
        <Input label="Top marking" mono list={listOf(used, id, "marking")} error={errors.marking?.message} {...register("marking")} />
        <Input label="What it holds" hint="Such as configuration data" list={listOf(used, id, "holds")} error={errors.holds?.message} {...register("holds")} />
        {role === "donor" ? (
          <Select label="Stands for which original chip" className="col-span-full" error={errors.pairedWith?.message}
            hint="Another pairing takes the approval of the original’s chip away."
            options={[{ value: "", label: originals.length > 0 ? "Not paired" : "Not paired: the original has no chip yet" }, ...originals.map((chip) => ({ value: chip.id, label: `Original ${chip.designator}${chip.pair ? `, paired with ${chip.pair.designator} on ${chip.pair.boardNumber}` : ""}` }))]}
            {...register("pairedWith")} />
        ) : <Checkbox className="col-span-full" label="This chip needs a transfer. Take the tick off for one that is kept for reference." {...register("needsTransfer")} />}
      </div>
      <Proposals used={used} id={id} names={NAMES} />
      {crossed ? <Note kind="caution" role="status" title={crossed}>On a two-chip board each image belongs to one place. Look at both boards before you save.</Note> : null}
      {board.dataInController ? <Note kind="note" title="This board’s own data lies inside the main controller.">A chip on it is kept for reference and takes part in no transfer.</Note> : null}
      {note ? <Note kind="note" title={note} /> : null}
      <ChipAnswers register={register} errors={errors} typed={typed} onTakeSize={onTakeSize} />
      {supply === "unknown" ? <Note kind="caution" title="Look the supply up before anyone clips on.">A 1.8 V chip is destroyed by 3.3 V or 5 V. Start at the lowest supply when there is no other way.</Note> : null}
    </>
  );
}
