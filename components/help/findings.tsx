import { FindingLine } from "@/components/ui/finding-line";
import type { MarkKind } from "@/components/ui/mark";
import { Section } from "@/components/ui/section";
import type { DiagnosisCode } from "@/lib/core/diagnose-cause";
import { SEVERITIES, type Severity } from "@/lib/core/words";
import { type FindingExample, findingExamples } from "./finding-examples";
import { FINDING_GROUPS, type FindingGroup, type FindingHelp } from "./finding-help";
import { Part, See } from "./prose";

const SEVERITY: Record<Severity, { word: string; mark: MarkKind; means: string }> = {
  blocks: { word: "Blocks", mark: "block", means: "No approval while this read counts. Only other reads, or a correction of what was typed, help." },
  reason: { word: "Needs a reason", mark: "caution", means: "A lead may approve all the same, and writes why. The text goes into the log and the bundle." },
  note: { word: "Note", mark: "note", means: "Good to know. It holds nothing up." },
};

const listOf = (group: FindingGroup) => Object.entries(group.findings) as [DiagnosisCode, FindingHelp][];

function Example({ said }: { said: readonly FindingExample[] }) {
  const [first] = said;
  return <p className="max-w-[55ch] border-l-[3px] border-rule-2 pl-3 text-t3">On screen: “{first.message} {first.advice}”</p>;
}

/** What it does to an approval. Two reads that differ carry no finding: that they differ is what stands against them. */
function Weight({ code, help }: { code: DiagnosisCode; help: FindingHelp }) {
  const given = SEVERITIES.filter((severity) => help.severity[severity]);
  if (code === "equal") return <FindingLine kind="ok"><b>Equal</b>, and no proof of sound content</FindingLine>;
  if (given.length === 0) return <FindingLine kind="block"><b>Reads disagree</b>, while both count</FindingLine>;
  return given.map((severity) => <FindingLine key={severity} kind={code === "verified" ? "ok" : SEVERITY[severity].mark}><b>{SEVERITY[severity].word}</b>, {help.severity[severity]}</FindingLine>);
}

function Finding({ code, help, said }: { code: DiagnosisCode; help: FindingHelp; said: readonly FindingExample[] }) {
  return (
    <article id={code} aria-labelledby={`${code}-title`} className="grid max-w-[53ch] gap-2.5 border-b text-t4 border-rule py-4 first:pt-0 last:border-0 target:-mx-3 target:bg-well target:px-3 print:break-inside-avoid">
      <h3 id={`${code}-title`} className="flex flex-wrap items-baseline gap-x-3 text-t4 font-bold">{help.title} <code className="text-t2 font-normal text-ink-2">{code}</code></h3>
      <div className="text-t3"><Weight code={code} help={help} /></div>
      <Example said={said} />
      <p className="text-t4">{help.means}</p>
      <ul className="grid list-disc gap-1 pl-6 text-t4">{help.bench.map((step) => <li key={step}>{step}</li>)}</ul>
      <p className="max-w-[53ch] text-t2 text-ink-2">Measured: {help.rule}</p>
    </article>
  );
}

/** Every code of the engine with the engine's own sentence: a code without words here is caught by a test. */
export function FindingsHelp() {
  const examples = findingExamples();
  return (
    <>
      <Part title="How to read this" first>
        <p>When a read is stored, the read check looks at the image by itself, at what else is on record, and at the other reads of the chip. What it finds is a sentence and an advice. “Looks like” means that it is a guess from the bytes; the electrical cause is for you to find. Each finding has one of three weights:</p>
        <div>{SEVERITIES.map((severity) => <FindingLine key={severity} kind={SEVERITY[severity].mark}><b>{SEVERITY[severity].word}.</b> {SEVERITY[severity].means}</FindingLine>)}</div>
        <p>The thresholds were set on real firmware images, so that sound ones raise no alarm. The causes and the steps at the bench are common practice, written down without a source. No finding is no proof either: see <See topic="limits" at="equal">what equal reads do not prove</See>.</p>
      </Part>
      <Section title="All findings" note="In order of what they look at.">
        <div className="grid gap-4">
          {FINDING_GROUPS.map((group) => (
            <nav key={group.key} aria-label={group.title}>
              <h3 className="text-t3 font-bold">{group.title}</h3>
              <ul className="mt-1 columns-3 gap-x-6 text-t3 phone:columns-1">{listOf(group).map(([code, { title }]) => <li key={code} className="break-inside-avoid"><a href={`#${code}`} className="inline-block py-0.5">{title}</a></li>)}</ul>
            </nav>
          ))}
        </div>
      </Section>
      {FINDING_GROUPS.map((group) => (
        <Section key={group.key} id={`group-${group.key}`} title={group.title} note={group.about}>
          {listOf(group).map(([code, help]) => <Finding key={code} code={code} help={help} said={examples.get(code) ?? []} />)}
        </Section>
      ))}
    </>
  );
}
