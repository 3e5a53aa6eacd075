"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { Button, Buttons } from "@/components/ui/button";
import { Dialog } from "@/components/ui/dialog";
import { Input } from "@/components/ui/input";
import { Note } from "@/components/ui/note";
import { Select } from "@/components/ui/select";
import { send } from "@/lib/http/send";
import { userInput } from "@/lib/schemas/user";
import { AccountLimits } from "./account-limits";
import { OneTimePassword } from "./one-time-password";
import { ROLE_OPTIONS, roleHint } from "./role-words";
import { useAccountForm } from "./use-account-form";

export function AddUser() {
  const router = useRouter();
  const [open, setOpen] = useState(false);
  const [shown, setShown] = useState<{ email: string; password: string } | null>(null);
  const { register, handleSubmit, role, cases, changeCases, refusal, setRefusal, refuse, reset, errorOf, onOpen, isListOpen, formState: { isSubmitting } } =
    useAccountForm(userInput, { email: "", name: "", role: "technician", endsOn: "", cases: null }, null);
  function close() {
    setOpen(false);
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
      refuse(error);
    }
  });
  return (
    <>
      <Button variant="lead" onClick={() => setOpen(true)}>Add a user…</Button>
      <Dialog open={open} onOpenChange={(next) => { if (!next && !isListOpen()) close(); }} title="Add a user">
        <form onSubmit={submit} noValidate className="grid gap-4">
          <Input label="Name" hint="As it stands in the custody log." autoComplete="off" error={errorOf("name")} {...register("name")} />
          <Input label="E-mail address" type="email" hint="To sign in with." autoComplete="off" error={errorOf("email")} {...register("email")} />
          <Select label="Role" options={ROLE_OPTIONS} hint={roleHint(role, role === "auditor" && cases !== null)} error={errorOf("role")} {...register("role")} />
          {role === "auditor" ? <AccountLimits cases={cases} onCases={changeCases} onOpen={onOpen} endsOn={register("endsOn")} errors={{ cases: errorOf("cases"), endsOn: errorOf("endsOn") }} /> : null}
          {refusal ? <Note kind="block" role="alert" title="No account was made.">{refusal}</Note> : null}
          <Buttons className="dialog-foot"><Button type="submit" variant="lead" disabled={isSubmitting}>Add and show a one-time password</Button><Button onClick={close}>Leave it</Button></Buttons>
        </form>
      </Dialog>
      <OneTimePassword shown={shown} onClose={() => setShown(null)} />
    </>
  );
}
