"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { type Resolver, useForm } from "react-hook-form";
import { FormDialog } from "@/components/ui/form-dialog";
import { Input } from "@/components/ui/input";
import { useChange } from "@/components/ui/use-change";
import { send } from "@/lib/http/send";
import { ShelfFields } from "./shelf-fields";
import { addForm, fieldsOf, type ShelfFields as Fields } from "./shelf-form";

const { reason: _unasked, ...EMPTY } = fieldsOf(null);

export function AddForm({ onClose }: { onClose(): void }) {
  const router = useRouter();
  const { refusal, busy, attempt } = useChange();
  const { register, control, handleSubmit, formState: { errors } } = useForm<Fields>({ resolver: zodResolver(addForm) as unknown as Resolver<Fields>, defaultValues: EMPTY });
  const submit = handleSubmit((input) => attempt(async () => {
    const { id } = await send<{ id: string }>("POST", "/api/shelf-boards", input);
    router.push(`/shelf/${id}`);
  }).then(() => undefined));
  return (
    <FormDialog onClose={onClose} title="Put a board on the shelf" description="It gets the next number. Write that on its bag." action="Put it on the shelf" busy={busy} refusal={refusal} onSubmit={() => void submit()}>
      <ShelfFields register={register} control={control} errors={errors} />
      <Input label="Reserved for case" mono hint="Leave empty when it is for any case" autoComplete="off" error={errors.reservedFor?.message} {...register("reservedFor")} />
    </FormDialog>
  );
}
