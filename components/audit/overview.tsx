import Link from "next/link";
import { ButtonLink } from "@/components/ui/button";
import { FindingLine } from "@/components/ui/finding-line";
import { Section } from "@/components/ui/section";
import { exactText } from "@/components/ui/times";
import { Verdict } from "@/components/ui/verdict";
import type { AuditOverview } from "@/lib/core/audit-rows";
import { auditVerdict, overviewLines } from "./audit-words";

/** Keeps each case number in one line. */
function CaseNumbers({ text }: { text: string }) {
  return text.split(/(\d\d-\d{4,})/).map((part, i) => (i % 2 === 1 ? <span key={i} className="whitespace-nowrap">{part}</span> : part));
}

/** Is anything wrong, and where: one sentence, then a line for each subject. */
export function Overview({ facts, timeZone }: { facts: AuditOverview; timeZone: string }) {
  const { mark, sentence, why, go } = auditVerdict(facts);
  return (
    <>
      <Section strong title="Verdict" note={exactText(facts.now, timeZone)}><Verdict mark={mark} sentence={<CaseNumbers text={sentence} />} why={why} buttons={go ? <ButtonLink variant="lead" href={go.href}>{go.label}</ButtonLink> : null} /></Section>
      <Section title="Where" note="What was found, subject by subject.">
        <table className="ruled lines">
          <caption className="sr-only">Subjects of the audit</caption>
          <thead><tr><th scope="col">Subject</th><th scope="col">What was found</th><th scope="col">When</th></tr></thead>
          <tbody>
            {overviewLines(facts).map((line) => (
              <tr key={line.key} className={line.mark === "block" ? "is-odd" : ""}>
                <th scope="row" className="whitespace-nowrap"><Link href={line.href}>{line.title}</Link></th>
                <td className="l-full [overflow-wrap:anywhere]"><FindingLine kind={line.mark}><span className="line-clamp-3 max-w-[90ch]">{line.sentence}</span></FindingLine></td>
                <td className="l-row whitespace-nowrap text-ink-2">{line.at ? `${line.since ? "all since " : ""}${exactText(line.at, timeZone)}` : null}</td>
              </tr>
            ))}
          </tbody>
        </table>
      </Section>
    </>
  );
}
