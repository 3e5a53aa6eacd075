import { stateMark } from "@/components/chip/chip-words";
import { waitsText } from "@/components/note/note-words";
import { PrintMenu } from "@/components/print/print-menu";
import { casePrints } from "@/components/print/print-words";
import { Mark } from "@/components/ui/mark";
import { PaperName } from "@/components/ui/paper-name";
import { dueText, momentText } from "@/components/ui/times";
import type { CaseView } from "@/lib/views";
import { caseState, waitsFor } from "./case-words";

/** The job ticket: stub with the number, then ruled boxes. */
export function Ticket({ view, timeZone, today }: { view: CaseView; timeZone: string; today: string }) {
  const { state, words } = caseState(view);
  const mark = state ? stateMark(state) : view.state === "closed" ? "done" : "wait";
  const late = view.state === "open" && view.dueOn !== null && view.dueOn < today;
  const waits = waitsFor(view.drives);
  return (
    <div className="ticket">
      <PaperName what={`Case ${view.ref}`} />
      <div className="stub">
        <div>
          <span className="text-t1 text-ink-2">Case</span>
          <h1 className="font-mono !text-[2rem] !leading-9 font-semibold tracking-[-0.03em]">{view.ref}</h1>
          <span className="text-t2 text-ink-2">on labels <span className="font-mono whitespace-nowrap">{view.refChecked}</span></span>
        </div>
        <dl>
          <div><dt>Due</dt><dd>{view.dueOn ? dueText(view.dueOn) : "No date"}{late ? <span className="text-block">, late</span> : null}</dd></div>
          <div><dt>Received</dt><dd>{view.receivedAt ? momentText(view.receivedAt, timeZone) : "not yet"}</dd></div>
          <div><dt>State</dt><dd className={mark === "block" ? "text-block" : ""}><Mark kind={mark} className="mr-1.5 [--hole:var(--sheet)]" />{words}</dd>{view.hold ? <dd className="flex items-start gap-1.5"><Mark kind="caution" className="mt-0.5 text-caution" /><a href="#notes">{waitsText(view.hold)}</a></dd> : null}</div>
        </dl>
        <div className="no-print mt-auto"><PrintMenu links={casePrints(view.id)} /></div>
      </div>
      <dl className="boxes">
        <div className="w4"><dt>Customer</dt><dd><b>{view.customer.name}</b>{view.customer.company ? <><br />{view.customer.company}</> : null}{view.customer.contact ? <><br />{view.customer.contact}</> : null}</dd></div>
        <div className="w4"><dt>Reach by</dt><dd>{view.customer.email}{view.customer.phone ? <><br />{view.customer.phone}</> : null}</dd></div>
        <div className="w4 e"><dt>Recorded by</dt><dd>{view.createdBy?.name ?? "the customer, on the form"}</dd></div>
        <div className="w8"><dt>Damage</dt><dd>{view.damage}</dd></div>
        <div className="w4 e"><dt>Summary goes to</dt><dd>{view.customer.email}{waits ? `; ${waits}` : ""}</dd></div>
        <div className="w8 l"><dt>Bench note</dt><dd>{view.note ?? <span className="text-ink-3">none</span>}</dd></div>
        <div className="w4 e l"><dt>{view.state === "closed" ? "Closed" : "Customer’s data"}</dt><dd>{view.state === "closed" ? view.closedReason ?? "Nothing was left open." : "Keep to what the customer asked for and to local law."}</dd></div>
      </dl>
    </div>
  );
}
