"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { Button } from "@/components/ui/button";
import { FormDialog } from "@/components/ui/form-dialog";
import { Note } from "@/components/ui/note";
import { useSay } from "@/components/ui/toast";
import { useChange } from "@/components/ui/use-change";
import { listText } from "@/lib/core/quantity";
import type { Policy } from "@/lib/core/words";
import { send } from "@/lib/http/send";
import type { CaseView } from "@/lib/views";
import { chipsToTransfer } from "./case-words";

/** Shows what goes out and to whom, then makes the private link and queues the mail. */
export function SendSummary({ view, policy, lead, mailStays }: { view: CaseView; policy: Policy; lead: boolean; /** no mail server is set */ mailStays: boolean }) {
  const router = useRouter();
  const say = useSay();
  const [open, setOpen] = useState(false);
  const { refusal, busy, attempt, clear } = useChange();
  const standing = view.shares.filter((share) => !share.withdrawnAt);
  const chips = chipsToTransfer(view.drives).map((chip) => chip.designator);
  async function submit() {
    if (!(await attempt(() => send("POST", `/api/cases/${view.id}/summary`, {})))) return;
    say({ text: `The mail to ${view.customer.email} is on its way.` });
    setOpen(false);
    router.refresh();
  }
  return (
    <>
      <Button variant={lead ? "lead" : "plain"} onClick={() => { clear(); setOpen(true); }}>Send summary…</Button>
      {open ? (
        <FormDialog onClose={() => setOpen(false)} title="Send the verification summary" action="Send it" busy={busy} refusal={refusal} onSubmit={() => void submit()}>
          <dl className="grid grid-cols-[120px_minmax(0,1fr)] gap-x-4 gap-y-2 slim:grid-cols-1">
            <dt className="text-ink-2">To</dt><dd className="[overflow-wrap:anywhere]">{view.customer.name}, <b>{view.customer.email}</b></dd>
            <dt className="text-ink-2">The mail holds</dt><dd>a private link and the hash of each drive’s latest log entry, nothing of the images</dd>
            <dt className="text-ink-2">The page shows</dt><dd>{listText(chips)}: state, digests, how many reads agreed, who approved and when, and what this does not promise</dd>
            <dt className="text-ink-2">The link lasts</dt><dd>{policy.shareDays} days, or until a lead withdraws it</dd>
          </dl>
          {mailStays ? <Note kind="caution" title="No mail server is set: this mail reaches nobody.">It is kept in the folder <span className="font-mono">mail-fake</span> of the data folder. Ask an admin to set one, then send the summary.</Note> : null}
          {policy.twoPersonRule ? null : <Note kind="caution" title="The two-person rule is off.">The summary says so.</Note>}
          {standing.length > 0 ? <Note kind="note" title={`${standing.length === 1 ? "A link is" : `${standing.length} links are`} out already.`}>This makes one more; the earlier keeps working.</Note> : null}
        </FormDialog>
      ) : null}
    </>
  );
}
