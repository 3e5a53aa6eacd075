import { type Control, type FieldErrors, useFieldArray, type UseFormRegister } from "react-hook-form";
import { Button } from "@/components/ui/button";
import { Input } from "@/components/ui/input";
import { Select } from "@/components/ui/select";
import { TextArea } from "@/components/ui/text-area";
import { MAX_SHELF_CHIPS } from "@/lib/schemas/shelf";
import { NO_CHIP, type ShelfFields as Fields } from "./shelf-form";
import { BUS_OPTIONS } from "./shelf-words";

interface Form {
  register: UseFormRegister<Fields>;
  control: Control<Fields>;
  errors: FieldErrors<Fields>;
}

/** What a board of the shelf is and where it lies. Only its number has to be known. */
export function ShelfFields({ register, control, errors }: Form) {
  return (
    <>
      <div className="grid grid-cols-2 gap-4 slim:grid-cols-1">
        <Input label="Board number" mono spellCheck={false} hint="Printed on the board, such as BX 40-3179" error={errors.boardNumber?.message} {...register("boardNumber")} />
        <Input label="Revision" mono spellCheck={false} hint="Leave empty when none is printed" error={errors.revision?.message} {...register("revision")} />
        <Input label="Marking of the main controller" mono spellCheck={false} error={errors.controllerMarking?.message} {...register("controllerMarking")} />
        <Input label="Marking of the motor driver" mono spellCheck={false} error={errors.motorDriverMarking?.message} {...register("motorDriverMarking")} />
      </div>
      <ChipList register={register} control={control} errors={errors} />
      <div className="grid grid-cols-2 gap-4 slim:grid-cols-1">
        <Input label="Origin" hint="Where it came from" error={errors.origin?.message} {...register("origin")} />
        <Input label="Place" hint="Where it lies" error={errors.place?.message} {...register("place")} />
        <TextArea label="Condition" rows={2} error={errors.condition?.message} {...register("condition")} />
        <TextArea label="Note" rows={2} error={errors.note?.message} {...register("note")} />
      </div>
    </>
  );
}

function ChipList({ register, control, errors }: Form) {
  const { fields, append, remove } = useFieldArray({ control, name: "chips" });
  return (
    <fieldset className="grid gap-3">
      <legend className="pb-1 font-semibold">Chips</legend>
      {fields.map((field, i) => {
        const wrong = errors.chips?.[i];
        return (
          <div key={field.id} role="group" aria-label={`Chip ${i + 1}`} className="grid grid-cols-3 gap-3 border-l-2 border-rule-2 pl-3 slim:grid-cols-2">
            <Input label="Designator" mono autoComplete="off" error={wrong?.designator?.message} {...register(`chips.${i}.designator`)} />
            <Select label="Bus" options={BUS_OPTIONS} error={wrong?.bus?.message} {...register(`chips.${i}.bus`)} />
            <Input label="Size" mono autoComplete="off" placeholder="512 KiB" error={wrong?.sizeBytes?.message} {...register(`chips.${i}.sizeBytes`)} />
            <Input label="Package" error={wrong?.package?.message} {...register(`chips.${i}.package`)} />
            <Input label="Top marking" mono error={wrong?.marking?.message} {...register(`chips.${i}.marking`)} />
            <Button size="small" className="self-end justify-self-start" onClick={() => remove(i)} aria-label={`Take chip ${i + 1} off the list`}>Take off</Button>
          </div>
        );
      })}
      <Button size="small" className="justify-self-start" reason={fields.length >= MAX_SHELF_CHIPS ? `At most ${MAX_SHELF_CHIPS} chips a board.` : null} onClick={() => append(NO_CHIP)}>Add a chip</Button>
    </fieldset>
  );
}
