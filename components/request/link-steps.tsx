"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { Button, Buttons } from "@/components/ui/button";
import { FormDialog } from "@/components/ui/form-dialog";
import { useChange } from "@/components/ui/use-change";
import { send } from "@/lib/http/send";

/** For a lead: a new private link for the customer, or none at all. */
export function LinkSteps({ requestId, email, works, closed }: { requestId: string; email: string; works: boolean; closed: boolean }) {
  const router = useRouter();
  const [asks, setAsks] = useState<"renew" | "withdraw" | null>(null);
  const { refusal, busy, attempt, clear } = useChange();
  const path = `/api/requests/${requestId}/link`;
  function close() {
    setAsks(null);
    clear();
  }
  async function submit(method: "POST" | "DELETE") {
    if (!(await attempt(() => send(method, path)))) return;
    close();
    router.refresh();
  }
  return (
    <Buttons>
      <Button onClick={() => setAsks("renew")} reason={closed ? "The case is closed." : null}>Send the customer a new link…</Button>
      {works ? <Button variant="stop" onClick={() => setAsks("withdraw")}>Withdraw the link…</Button> : null}
      {asks === "renew" ? <FormDialog onClose={close} title="Send a new link" description={`A new private link goes to ${email}. The former one shows nothing from that moment on.`} action="Send a new link" busy={busy} refusal={refusal} onSubmit={() => void submit("POST")} /> : null}
      {asks === "withdraw" ? <FormDialog onClose={close} title="Withdraw the link" description="The customer’s page shows nothing from now on, until a new link is sent." action="Withdraw the link" variant="stop" busy={busy} refusal={refusal} onSubmit={() => void submit("DELETE")} /> : null}
    </Buttons>
  );
}
