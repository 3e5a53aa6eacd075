"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useState } from "react";
import { useForm, useWatch } from "react-hook-form";
import { Button, Buttons } from "@/components/ui/button";
import { Dialog } from "@/components/ui/dialog";
import { Input } from "@/components/ui/input";
import { Note } from "@/components/ui/note";
import { Select } from "@/components/ui/select";
import { useSay } from "@/components/ui/toast";
import { Refusal, send } from "@/lib/http/send";
import { type UserChange, userInput } from "@/lib/schemas/user";
import type { UserView } from "@/lib/views";
import { ROLE_OPTIONS, roleDoes } from "./role-words";

const form = userInput.pick({ name: true, role: true });

/** Name and role; what a new role takes away counts at the next request. */
export function ChangeUser({ user, onClose }: { user: UserView; onClose(): void }) {
  const router = useRouter();
  const say = useSay();
  const [refusal, setRefusal] = useState<string | null>(null);
  const { register, control, handleSubmit, formState: { errors, isSubmitting, isDirty } } = useForm({ resolver: zodResolver(form), defaultValues: { name: user.name, role: user.role } });
  const role = useWatch({ control, name: "role" });
  const submit = handleSubmit(async (input) => {
    setRefusal(null);
    const changes: UserChange = { ...(input.name === user.name ? {} : { name: input.name }), ...(input.role === user.role ? {} : { role: input.role }) };
    try {
      await send("PATCH", `/api/users/${user.id}`, changes);
      router.refresh();
      say({ text: `The account of ${input.name} is changed.` });
      onClose();
    } catch (error) {
      if (!(error instanceof Refusal)) throw error;
      setRefusal(error.detail);
    }
  });
  return (
    <Dialog open onOpenChange={(open) => { if (!open) onClose(); }} title={`Change ${user.name}`} description={user.email}>
      <form onSubmit={submit} noValidate className="grid gap-4">
        <Input label="Name" hint="Entries already in the log keep the former name." autoComplete="off" error={errors.name?.message} {...register("name")} />
        <Select label="Role" options={ROLE_OPTIONS} hint={`A ${role} ${roleDoes(role)}.`.replace(/^A a/, "An a")} error={errors.role?.message} {...register("role")} />
        {refusal ? <Note kind="block" role="alert" title="Nothing was changed.">{refusal}</Note> : null}
        <Buttons><Button type="submit" variant="lead" disabled={isSubmitting} reason={isDirty ? null : "Nothing differs yet."}>Change</Button><Button onClick={onClose}>Leave it</Button></Buttons>
      </form>
    </Dialog>
  );
}
