import { VOTE_FINDINGS } from "@/components/composite/composite-words";
import { FindingLine } from "@/components/ui/finding-line";
import { HelpLink } from "@/components/ui/help-link";
import { countOf } from "@/lib/core/quantity";
import type { ChipView, ReadView } from "@/lib/views";
import { findingMark, nameOf, namesOf, oddReads, twins } from "./chip-words";

/** How many bytes differ from the first read of the largest group, as far as the matrix knows. */
function differenceText(chip: ChipView, read: ReadView): string {
  const odd = oddReads(chip.reads, "before");
  const other = chip.reads.find((r) => r.stage === "before" && r.counted && r.id !== read.id && !odd.includes(r)) ?? chip.reads.find((r) => r.stage === "before" && r.counted && r.sha256 !== read.sha256);
  if (!other) return "Differs";
  const row = chip.matrix.reads.findIndex((r) => r.number === read.number);
  const column = chip.matrix.reads.findIndex((r) => r.number === other.number);
  const value = chip.matrix.cells[row]?.[column];
  if (typeof value !== "number") return `Differs from ${nameOf(other)} in its size`;
  return `${countOf(value, "byte")} ${value === 1 ? "differs" : "differ"} from ${nameOf(other)}`;
}

/** Marks and plain clauses of one read: set aside, equal or odd, then what the rules found. */
export function ReadFindings({ chip, read }: { chip: ChipView; read: ReadView }) {
  const same = twins(read, chip.reads);
  const odd = oddReads(chip.reads, read.stage).some((r) => r.id === read.id);
  const backs = read.stage === "after";
  const cleared = chip.approvals.find((a) => a.id === chip.transfers.find((t) => t.id === read.transferId)?.approvalId);
  return (
    <>
      {read.setAside ? <FindingLine kind="aside">Set aside by {read.setAside.by.name}: {read.setAside.reason}</FindingLine> : null}
      {read.erased ? <FindingLine kind="aside">{read.erased.text}</FindingLine> : read.imageSound ? null : <FindingLine kind="block">The stored image is damaged or missing. Tell the lead before anything else.</FindingLine>}
      {backs && cleared && cleared.sha256 === read.sha256 && !read.findings.some((f) => f.code === "verified") ? <FindingLine kind="ok">Equals the approved image</FindingLine> : null}
      {!backs && odd ? <FindingLine kind="block">{read.stage === "before" ? differenceText(chip, read) : `Differs from the donor’s other reads`}</FindingLine> : null}
      {!backs && read.counted && same.length > 0 ? <FindingLine kind="ok">Equals {namesOf(read.stage, same.map((r) => r.number))}</FindingLine> : null}
      {read.findings.map((finding) => <FindingLine key={finding.code} kind={findingMark(finding)}>{finding.message} {finding.code === "verified" || VOTE_FINDINGS.includes(finding.code) ? "" : finding.advice}{finding.code === "verified" ? null : <> <HelpLink href={`/help/findings#${finding.code}`} about={finding.message} /></>}</FindingLine>)}
      {!backs && read.counted && !odd && same.length === 0 && read.findings.length === 0 ? <FindingLine kind="wait">Nothing to compare it with yet</FindingLine> : null}
      {read.note ? <span className="mt-1 block text-t2 text-ink-2">“{read.note}”</span> : null}
    </>
  );
}
