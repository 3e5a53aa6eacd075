"use client";

import { useRouter } from "next/navigation";
import { Button, Buttons } from "@/components/ui/button";
import { Icon } from "@/components/ui/icon";
import { Mark } from "@/components/ui/mark";
import { Note } from "@/components/ui/note";
import { momentText } from "@/components/ui/times";
import { useSay } from "@/components/ui/toast";
import { useChange } from "@/components/ui/use-change";
import { send } from "@/lib/http/send";
import type { MailView } from "@/lib/views";
import { MailPreview } from "./mail-preview";
import { mailState } from "./mail-words";

/** One mail: to whom, how far it is, its text on request, and another try when it was given up. */
export function MailLine({ mail, timeZone }: { mail: MailView; timeZone: string }) {
  const router = useRouter();
  const say = useSay();
  const { mark, words, twice } = mailState(mail);
  const { refusal, busy, attempt } = useChange();
  const retry = () => attempt(async () => {
    await send("POST", `/api/mails/${mail.id}/retry`);
    router.refresh();
    say({ text: `The mail to ${mail.to} waits to be sent again.` });
  });
  return (
    <li className="border-b border-rule py-2.5">
      <details className="group">
        <summary className="grid cursor-pointer grid-cols-[minmax(0,2fr)_minmax(0,3fr)_180px_140px] items-baseline gap-x-4 gap-y-0.5 phone:grid-cols-[minmax(0,1fr)]">
          <b className="[overflow-wrap:anywhere]">{mail.to}</b>
          <span className="[overflow-wrap:anywhere]">{mail.subject}</span>
          <span className={mail.state === "dead" ? "text-block" : ""}><Mark kind={mark} className={twice ? "text-caution" : "[--hole:var(--paper)]"} /> {words}</span>
          <span className="text-ink-2">{momentText(mail.sentAt ?? mail.queuedAt, timeZone)}<span className="pl-2 text-green"><Icon name="menu" label="Read the text" className="group-open:rotate-180" /></span></span>
        </summary>
        <div className="grid gap-2 pt-2.5">
          {mail.lastError ? <Note kind={mail.state === "dead" ? "block" : "caution"} title={twice ? "It may have arrived twice." : "What the mail server said last:"}>{mail.lastError}</Note> : null}
          <p className="text-t2 text-ink-2">Written {momentText(mail.queuedAt, timeZone)}{mail.sentAt ? `, sent ${momentText(mail.sentAt, timeZone)}` : ""}. Secret links are masked here.</p>
          <MailPreview subject={mail.subject} text={mail.text} html={mail.html} />
        </div>
      </details>
      {refusal ? <Note kind="block" role="alert" title="It was not put back." className="mt-2">{refusal}</Note> : null}
      {mail.state === "dead" ? <Buttons className="pt-2"><Button size="small" disabled={busy} onClick={() => void retry()}>Try again</Button></Buttons> : null}
    </li>
  );
}
