import type { UseFormRegisterReturn } from "react-hook-form";
import { Input } from "@/components/ui/input";
import { TextArea } from "@/components/ui/text-area";

export type BoardField = "boardNumber" | "revision" | "controllerMarking" | "motorDriverMarking" | "condition";

export function BoardFields({ register, errors }: { register(name: BoardField): UseFormRegisterReturn; errors: Partial<Record<BoardField, { message?: string }>> }) {
  return (
    <div className="grid grid-cols-2 gap-4 slim:grid-cols-1">
      <Input label="Board number" mono hint="Printed on the board, such as BX 40-3179" error={errors.boardNumber?.message} {...register("boardNumber")} />
      <Input label="Revision" mono hint="Leave empty when none is printed" error={errors.revision?.message} {...register("revision")} />
      <Input label="Marking of the main controller" mono error={errors.controllerMarking?.message} {...register("controllerMarking")} />
      <Input label="Marking of the motor driver" mono error={errors.motorDriverMarking?.message} {...register("motorDriverMarking")} />
      <TextArea label="Condition" className="col-span-full" hint="What you see: burnt, wet, broken, clean under the loupe" error={errors.condition?.message} {...register("condition")} />
    </div>
  );
}
