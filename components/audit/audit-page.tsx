import type { ReactNode } from "react";
import { DeskShell } from "@/components/shell/desk-shell";
import { PageMain } from "@/components/shell/page-main";
import { PaperName } from "@/components/ui/paper-name";
import { PageTitle } from "@/components/ui/section";
import type { SessionView } from "@/lib/views";
import { AuditNav } from "./audit-nav";
import type { AuditSection } from "./audit-sections";

/** What every audit page is made of: the shell, its title, and the way to the others. */
export function AuditPage({ session, current, title, note, buttons, children }: {
  session: SessionView;
  current: AuditSection | null;
  title: string;
  note?: ReactNode;
  buttons?: ReactNode;
  children: ReactNode;
}) {
  return (
    <DeskShell session={session} current="audit">
      <PageMain className="pb-8">
        <PaperName what={`Audit, ${title}`} />
        <div className="flex flex-wrap items-end justify-between gap-x-4">
          <PageTitle note={note}>{title}</PageTitle>
          {buttons ? <div className="no-print flex flex-wrap gap-3 pb-5">{buttons}</div> : null}
        </div>
        <AuditNav current={current} limited={session.user.cases !== undefined} />
        {children}
      </PageMain>
    </DeskShell>
  );
}
