import { Button } from "@/components/ui/button";
import { DigestInFull } from "@/components/ui/digest";
import { Icon } from "@/components/ui/icon";
import { Section } from "@/components/ui/section";
import { Verdict } from "@/components/ui/verdict";
import { countOf, withCommas } from "@/lib/core/quantity";
import type { VerifyReport } from "@/lib/core/verify/report";
import { StepList } from "./step-list";

/** The verdict on a bundle, what was checked, and the numbers to compare with what came another way. */
export function BundleResult({ file, report, onAnother }: { file: File; report: VerifyReport; onAnother(): void }) {
  const { facts } = report;
  const good = report.verdict === "in-order";
  const stranger = report.steps.find((step) => step.key === "fingerprint")?.state === "not-checked";
  return (
    <>
      <Section title="Verdict" note={<span className="[overflow-wrap:anywhere]">{file.name}, {countOf(file.size, "byte")}</span>} strong>
        <Verdict mark={good ? "ok" : "block"} sentence={<span className="[overflow-wrap:anywhere]">{report.sentence}</span>}
          why={good && stranger ? "The bundle fits together in every part. Whether it is the workshop’s own shows when you compare a key’s fingerprint with the one in the mail or on the summary." : undefined}
          buttons={<><Button onClick={() => window.print()}><Icon name="print" />Print</Button><Button variant="text" onClick={onAnother}>Check another file</Button></>} />
      </Section>
      <Section title="What was checked" note={report.steps.length > 1 ? `${countOf(report.steps.length, "part")}, in the order in which each leans on the one before.` : "Nothing behind it could be looked at."}><StepList steps={report.steps} /></Section>
      {facts.logKey || facts.heads.length > 0 ? (
        <Section title="To compare" note="With the mail of the daily seal, with the summary, or with an earlier bundle of this case.">
          <dl className="grid gap-3">
            {facts.logKey ? <div><dt className="text-t2 text-ink-2">Fingerprint of the log key</dt><dd><DigestInFull sha256={facts.logKey} /></dd></div> : null}
            {facts.sealKey ? <div><dt className="text-t2 text-ink-2">Fingerprint of the seal key</dt><dd><DigestInFull sha256={facts.sealKey} /></dd></div> : null}
            {facts.heads.map(({ drive, seq, hash }) => <div key={drive}><dt className="text-t2 text-ink-2">Log of drive {drive} ends with entry {withCommas(seq)}</dt><dd><DigestInFull sha256={hash} /></dd></div>)}
          </dl>
        </Section>
      ) : null}
    </>
  );
}
