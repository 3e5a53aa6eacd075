"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { Button } from "@/components/ui/button";
import { FormDialog } from "@/components/ui/form-dialog";
import { TextArea } from "@/components/ui/text-area";
import { useChange } from "@/components/ui/use-change";
import { send } from "@/lib/http/send";

/** Asks for deletion, with a message to the lead who answers. */
export function AskDeletion({ token, answerDays }: { token: string; answerDays: number }) {
  const router = useRouter();
  const [open, setOpen] = useState(false);
  const [message, setMessage] = useState("");
  const { refusal, busy, attempt } = useChange();
  async function submit() {
    if (!(await attempt(() => send("POST", "/api/requests/deletion", { token, message })))) return;
    setOpen(false);
    router.refresh();
  }
  return (
    <>
      <Button onClick={() => setOpen(true)}>Ask for deletion…</Button>
      {open ? (
        <FormDialog onClose={() => setOpen(false)} title="Ask for deletion" action="Ask for deletion" busy={busy} refusal={refusal} onSubmit={() => void submit()}
          description={`A lead technician reads this and answers within ${answerDays} days. Nothing is deleted at once: work on your drive may hang on it.`}>
          <TextArea label="Message" hint="What should be deleted, if not all. May stay empty." rows={3} maxLength={2000} value={message} onChange={(event) => setMessage(event.target.value)} />
        </FormDialog>
      ) : null}
    </>
  );
}

/** Takes the request back as long as the parcel isn't there. */
export function WithdrawRequest({ token, refChecked }: { token: string; refChecked: string }) {
  const router = useRouter();
  const [open, setOpen] = useState(false);
  const { refusal, busy, attempt } = useChange();
  async function submit() {
    if (!(await attempt(() => send("POST", "/api/requests/withdrawal", { token })))) return;
    setOpen(false);
    router.refresh();
  }
  return (
    <>
      <Button variant="stop" onClick={() => setOpen(true)}>Withdraw the request…</Button>
      {open ? (
        <FormDialog onClose={() => setOpen(false)} title="Withdraw the request" action="Withdraw the request" variant="stop" busy={busy} refusal={refusal} onSubmit={() => void submit()}
          description={`Case ${refChecked} is closed at once, and the slip is worth nothing any more. If your parcel is on its way already, tell us instead.`} />
      ) : null}
    </>
  );
}
