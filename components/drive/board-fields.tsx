import { useId } from "react";
import type { UseFormRegisterReturn } from "react-hook-form";
import { Checkbox } from "@/components/ui/checkbox";
import { Input } from "@/components/ui/input";
import { TextArea } from "@/components/ui/text-area";
import type { BoardRole } from "@/lib/core/words";
import type { LastUsed, Proposed } from "./last-used";
import { NoChipToMove } from "./no-chip-to-move";
import { listOf, Proposals } from "./proposals";

export type BoardField = "boardNumber" | "revision" | "controllerMarking" | "motorDriverMarking" | "condition" | "dataInController";

const NAMES: readonly Proposed[] = ["boardNumber", "revision", "controllerMarking", "motorDriverMarking"];

export function BoardFields({ role, register, errors, dataInController, used = {} }: {
  role: BoardRole;
  register(name: BoardField): UseFormRegisterReturn;
  errors: Partial<Record<BoardField, { message?: string }>>;
  /** as ticked so far */
  dataInController: boolean;
  used?: LastUsed;
}) {
  const id = useId();
  const text = (name: "boardNumber" | "revision" | "controllerMarking" | "motorDriverMarking") => ({ mono: true, spellCheck: false, list: listOf(used, id, name), error: errors[name]?.message, ...register(name) });
  return (
    <>
      <div className="grid grid-cols-2 gap-4 slim:grid-cols-1">
        <Input label="Board number" hint="Printed on the board, such as BX 40-3179" {...text("boardNumber")} />
        <Input label="Revision" hint="Leave empty when none is printed" {...text("revision")} />
        <Input label="Marking of the main controller" {...text("controllerMarking")} />
        <Input label="Marking of the motor driver" {...text("motorDriverMarking")} />
        <TextArea label="Condition" className="col-span-full" hint="What you see: burnt, wet, broken, clean under the loupe" error={errors.condition?.message} {...register("condition")} />
        {role === "original" ? <Checkbox className="col-span-full" label="Its unique data lies inside the main controller: there is no chip to move." error={errors.dataInController?.message} {...register("dataInController")} /> : null}
      </div>
      <Proposals used={used} id={id} names={NAMES} />
      {dataInController ? <NoChipToMove /> : null}
    </>
  );
}
