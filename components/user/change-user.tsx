"use client";

import { useRouter } from "next/navigation";
import { Button, Buttons } from "@/components/ui/button";
import { Dialog } from "@/components/ui/dialog";
import { Input } from "@/components/ui/input";
import { Note } from "@/components/ui/note";
import { Select } from "@/components/ui/select";
import { useSay } from "@/components/ui/toast";
import { send } from "@/lib/http/send";
import { type UserChange, type UserForm, userForm } from "@/lib/schemas/user";
import type { UserView } from "@/lib/views";
import { AccountLimits } from "./account-limits";
import { limitsText, ROLE_OPTIONS, roleHint } from "./role-words";
import { useAccountForm } from "./use-account-form";

const same = (a: readonly string[] | null, b: readonly string[] | null) => JSON.stringify(a && [...a].sort()) === JSON.stringify(b && [...b].sort());

/** Only what differs from what stands; the server takes list and last day away with the role by itself. */
function changesOf(user: UserView, input: UserForm): UserChange {
  const cases = input.cases ?? null;
  const endsOn = input.endsOn ?? null;
  const auditor = input.role === "auditor";
  return {
    ...(input.name === user.name ? {} : { name: input.name }), ...(input.role === user.role ? {} : { role: input.role }),
    ...(auditor && !same(cases, user.cases && user.cases.map((one) => one.id)) ? { cases } : {}), ...(auditor && endsOn !== user.endsOn ? { endsOn } : {}),
  };
}

/** Name, role, and what an auditor sees until when; what a change takes away counts at the next request. */
export function ChangeUser({ user, onClose }: { user: UserView; onClose(): void }) {
  const router = useRouter();
  const say = useSay();
  const { register, handleSubmit, role, cases, changeCases, refusal, setRefusal, refuse, errorOf, onOpen, isListOpen, formState: { isSubmitting, isDirty } } =
    useAccountForm(userForm, { name: user.name, role: user.role, endsOn: user.endsOn ?? "", cases: user.cases && user.cases.map((one) => one.id) }, user.cases);
  const submit = handleSubmit(async (input) => {
    setRefusal(null);
    try {
      await send("PATCH", `/api/users/${user.id}`, changesOf(user, input));
      router.refresh();
      say({ text: `The account of ${input.name} is changed.` });
      onClose();
    } catch (error) {
      refuse(error);
    }
  });
  const takenAway = role === "auditor" ? null : limitsText(user);
  return (
    <Dialog open onOpenChange={(open) => { if (!open && !isListOpen()) onClose(); }} title={`Change ${user.name}`} description={user.email}>
      <form onSubmit={submit} noValidate className="grid gap-4">
        <Input label="Name" hint="Entries already in the log keep the former name." autoComplete="off" error={errorOf("name")} {...register("name")} />
        <Select label="Role" options={ROLE_OPTIONS} hint={roleHint(role, role === "auditor" && cases !== null)} error={errorOf("role")} {...register("role")} />
        {role === "auditor" ? <AccountLimits cases={cases} onCases={changeCases} onOpen={onOpen} endsOn={register("endsOn")} errors={{ cases: errorOf("cases"), endsOn: errorOf("endsOn") }} /> : null}
        {takenAway ? <Note kind="caution" title="With this role the limits of the account go.">{`It is ${takenAway}. As ${role} it carries neither a case list nor a last day.`}</Note> : null}
        {refusal ? <Note kind="block" role="alert" title="Nothing was changed.">{refusal}</Note> : null}
        <Buttons className="dialog-foot"><Button type="submit" variant="lead" disabled={isSubmitting} reason={isDirty ? null : "Nothing differs yet."}>Change</Button><Button onClick={onClose}>Leave it</Button></Buttons>
      </form>
    </Dialog>
  );
}
