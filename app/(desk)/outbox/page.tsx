import type { Metadata } from "next";
import { MailLine } from "@/components/outbox/mail-line";
import { TemplateList } from "@/components/outbox/template-list";
import { DeskShell } from "@/components/shell/desk-shell";
import { PageMain } from "@/components/shell/page-main";
import { Button } from "@/components/ui/button";
import { Empty } from "@/components/ui/empty";
import { Input } from "@/components/ui/input";
import { Note } from "@/components/ui/note";
import { PastTheEnd, Pages } from "@/components/ui/pages";
import { PageTitle, Section } from "@/components/ui/section";
import { signedIn } from "@/lib/auth/page";
import { orNotFound } from "@/lib/http/page-errors";
import { mailStaysHere } from "@/lib/queries/first-steps";
import { mailList, templateList } from "@/lib/queries/mails";
import { listInput } from "@/lib/schemas/case";

export const metadata: Metadata = { title: "Outbox" };

export default async function OutboxPage({ searchParams }: { searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const query = await searchParams;
  const { actor, session } = await signedIn();
  const asked = listInput.safeParse({ order: "desc", ...query });
  const input = asked.success ? asked.data : listInput.parse({ order: "desc" });
  const list = await orNotFound(() => mailList(actor, input));
  const pages = { total: list.total, page: list.page, pageSize: list.pageSize, href: (page: number) => `/outbox?${new URLSearchParams({ q: input.q, page: String(page) })}` };
  return (
    <DeskShell session={session} current="outbox">
      <PageMain className="pb-8">
        <PageTitle note="Every mail waits here first and is sent from here. One that can’t be delivered is tried again, then given up and shown so.">Outbox</PageTitle>
        {mailStaysHere() ? <Note kind="caution" title="No mail server is set: these mails reach nobody." className="mb-5 max-w-[76ch]">What is shown as sent was put into the folder <span className="font-mono">mail-fake</span> of the data folder on this machine. Put <span className="font-mono">SMTP_URL</span> and <span className="font-mono">SMTP_FROM</span> into the file <span className="font-mono">.env</span> and start Twinread again to send mail.</Note> : null}
        <form className="no-print flex max-w-[560px] items-end gap-3 pb-5" role="search" aria-label="Mails">
          <Input key={input.q} className="flex-1" label="Address or subject" name="q" defaultValue={input.q} maxLength={200} autoComplete="off" />
          <Button type="submit">Search</Button>
        </form>
        {list.items.length === 0 && list.total > 0 ? <PastTheEnd {...pages} /> : list.items.length === 0 ? <Empty title={input.q ? `No mail matches “${input.q}”.` : "No mail yet."}>What is written when is listed below.</Empty> : (
          <>
            <ul className="border-t border-rule-2">{list.items.map((mail) => <MailLine key={mail.id} mail={mail} timeZone={session.timeZone} />)}</ul>
            <Pages {...pages} />
          </>
        )}
        <div className="pt-8"><Section title="What is written when" note="Each kind of mail, with invented facts."><TemplateList templates={templateList(actor)} /></Section></div>
      </PageMain>
    </DeskShell>
  );
}
