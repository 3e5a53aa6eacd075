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
import { Refusal, send } from "@/lib/http/send";
import { type UserInput, userInput } from "@/lib/schemas/user";
import { OneTimePassword } from "./one-time-password";
import { ROLE_OPTIONS, roleDoes } from "./role-words";

export function AddUser() {
  const router = useRouter();
  const [open, setOpen] = useState(false);
  const [refusal, setRefusal] = useState<string | null>(null);
  const [shown, setShown] = useState<{ email: string; password: string } | null>(null);
  const { register, control, handleSubmit, reset, formState: { errors, isSubmitting } } = useForm<UserInput>({ resolver: zodResolver(userInput), defaultValues: { email: "", name: "", role: "technician" } });
  const role = useWatch({ control, name: "role" });
  function close() {
    setOpen(false);
    setRefusal(null);
    reset();
  }
  const submit = handleSubmit(async (input) => {
    setRefusal(null);
    try {
      const { user, password } = await send<{ user: { email: string }; password: string }>("POST", "/api/users", input);
      close();
      setShown({ email: user.email, password });
      router.refresh();
    } catch (error) {
      if (!(error instanceof Refusal)) throw error;
      setRefusal(error.detail);
    }
  });
  return (
    <>
      <Button variant="lead" onClick={() => setOpen(true)}>Add a user…</Button>
      <Dialog open={open} onOpenChange={(next) => { if (!next) close(); }} title="Add a user">
        <form onSubmit={submit} noValidate className="grid gap-4">
          <Input label="Name" hint="As it stands in the custody log." autoComplete="off" error={errors.name?.message} {...register("name")} />
          <Input label="E-mail address" type="email" hint="To sign in with." autoComplete="off" error={errors.email?.message} {...register("email")} />
          <Select label="Role" options={ROLE_OPTIONS} hint={`A ${role} ${roleDoes(role)}.`.replace(/^A a/, "An a")} error={errors.role?.message} {...register("role")} />
          {refusal ? <Note kind="block" role="alert" title="No account was made.">{refusal}</Note> : null}
          <Buttons><Button type="submit" variant="lead" disabled={isSubmitting}>Add and show a one-time password</Button><Button onClick={close}>Leave it</Button></Buttons>
        </form>
      </Dialog>
      <OneTimePassword shown={shown} onClose={() => setShown(null)} />
    </>
  );
}
