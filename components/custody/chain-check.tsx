import { Digest } from "@/components/ui/digest";
import { FindingLine } from "@/components/ui/finding-line";
import { Verdict } from "@/components/ui/verdict";
import type { CustodyCheckView } from "@/lib/views";
import { checkWords, problemWords } from "./log-words";

/** What the check of one chain found, in plain words. */
export function ChainCheck({ check, subject, onShow }: { check: CustodyCheckView; subject?: "workshop"; onShow?(seq: number): void }) {
  const { sentence, why } = checkWords(check);
  return (
    <>
      <Verdict mark={check.ok ? "ok" : "block"} sentence={sentence} why={check.ok || subject !== "workshop" ? why : "Entries of accounts, policy and keys stand here. Nothing was repaired."}
        aside={<dl className="min-w-[240px]"><dt className="text-t1 text-ink-2">Hash of the last entry, {check.head.seq}</dt><dd className="font-medium"><Digest sha256={check.head.hash} /></dd></dl>} />
      {check.findings.length > 0 ? (
        <ul className="mt-4 grid gap-1.5">
          {check.findings.map((finding, i) => (
            <li key={i}>
              <FindingLine kind="block">
                {finding.seq !== null ? <a href={`#entry-${finding.seq}`} onClick={onShow && ((event) => { event.preventDefault(); onShow(finding.seq!); })}>{problemWords(finding)}</a> : problemWords(finding)}
                {finding.expected && finding.problem !== "tail-missing" ? <span className="block text-t2 text-ink-2 [overflow-wrap:anywhere]">Expected <code>{finding.expected}</code>{finding.found ? <>, found <code>{finding.found}</code></> : null}</span> : null}
              </FindingLine>
            </li>
          ))}
        </ul>
      ) : null}
    </>
  );
}
