"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { Button } from "@/components/ui/button";
import { FormDialog } from "@/components/ui/form-dialog";
import { useChange } from "@/components/ui/use-change";
import { send } from "@/lib/http/send";
import type { ShareView } from "@/lib/views";

export function WithdrawShare({ share }: { share: ShareView }) {
  const router = useRouter();
  const [open, setOpen] = useState(false);
  const { refusal, busy, attempt } = useChange();
  async function submit() {
    if (!(await attempt(() => send("DELETE", `/api/shares/${share.id}`)))) return;
    setOpen(false);
    router.refresh();
  }
  return (
    <>
      <Button size="small" onClick={() => setOpen(true)}>Withdraw…</Button>
      {open ? <FormDialog onClose={() => setOpen(false)} title="Withdraw this link" description={`The link sent to ${share.email} stops working at once. The step goes into the log of every drive of the case.`} action="Withdraw the link" variant="stop" busy={busy} refusal={refusal} onSubmit={() => void submit()} /> : null}
    </>
  );
}
