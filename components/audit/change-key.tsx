"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useState } from "react";
import { useForm } from "react-hook-form";
import { Button } from "@/components/ui/button";
import { FormDialog } from "@/components/ui/form-dialog";
import { TextArea } from "@/components/ui/text-area";
import { useSay } from "@/components/ui/toast";
import { useChange } from "@/components/ui/use-change";
import type { KeyPurpose } from "@/lib/core/words";
import { send } from "@/lib/http/send";
import { keyChangeInput, type KeyChangeInput } from "@/lib/schemas/seal";

const WHAT = {
  seal: { name: "the key of the seals", meaning: "From now on seals are signed with a new key. Its fingerprint is a different one: tell the auditors why before the next seal reaches them, or they will take it for a forgery. Earlier seals keep their key and still check out." },
  log: { name: "the key of the logs", meaning: "From now on entries are signed with a new key, which the present one introduces in the workshop's log. Entries signed before keep their key and still check out. Entries that somebody signs with the former key later are found by the check." },
} as const;

/** Asks for the reason and says what it means before a key is changed. */
export function ChangeKey({ purpose }: { purpose: KeyPurpose }) {
  const router = useRouter();
  const say = useSay();
  const [open, setOpen] = useState(false);
  const { refusal, busy, attempt, clear } = useChange();
  const { register, handleSubmit, reset, formState: { errors } } = useForm<KeyChangeInput>({ resolver: zodResolver(keyChangeInput), defaultValues: { purpose, reason: "" } });
  const close = () => { setOpen(false); clear(); reset(); };
  const submit = handleSubmit(async (input) => {
    if (!(await attempt(() => send("POST", "/api/keys", input)))) return;
    close();
    say({ text: `There is a new key for the ${purpose === "seal" ? "seals" : "logs"}. Its fingerprint stands on this page.` });
    router.refresh();
  });
  return (
    <>
      <Button size="small" onClick={() => setOpen(true)}>Change the key…<span className="sr-only"> {WHAT[purpose].name}</span></Button>
      {open ? (
        <FormDialog onClose={close} title={`Change ${WHAT[purpose].name}`} description={WHAT[purpose].meaning} action="Change the key" variant="stop" busy={busy} refusal={refusal} onSubmit={() => void submit()}>
          <TextArea label="Reason" rows={3} hint="It becomes a signed entry of the workshop's log, and auditors read it." error={errors.reason?.message} {...register("reason")} />
        </FormDialog>
      ) : null}
    </>
  );
}
