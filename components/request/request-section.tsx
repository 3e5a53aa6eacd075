import type { ReactNode } from "react";
import { Section } from "@/components/ui/section";
import { dayYearText, momentText } from "@/components/ui/times";
import type { RequestSectionView } from "@/lib/views";
import { LinkSteps } from "./link-steps";
import { Told } from "./told";

/** On the case's page: everything the customer asked and agreed to, as typed, and the private link. */
export function RequestSection({ view, wish, timeZone, answers }: {
  view: RequestSectionView;
  /** the customer’s wish for deletion, where there is one */
  wish: ReactNode;
  timeZone: string;
  /** may send a new link or withdraw the present one */
  answers: boolean;
}) {
  const { link } = view;
  return (
    <Section title="Request" note={`By the customer, on the form, ${momentText(view.requestedAt, timeZone)}. As typed.`} id="request">
      <div className="grid gap-4">
        {wish}
        <p>The customer’s page says: <b>{view.shown}</b> {link.works ? <span className="text-ink-2">{link.ends ? `It ends on ${dayYearText(link.ends, timeZone)}.` : "It ends some time after the case is closed."}</span> : <span className="text-ink-2">But the link shows nothing any more.</span>}</p>
        <Told answers={view.answers} />
        {answers ? <LinkSteps requestId={view.id} email={view.answers.email} works={link.works} closed={view.closed} /> : null}
      </div>
    </Section>
  );
}
