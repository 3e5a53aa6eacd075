import { compositeBehind, VOTE_FINDINGS, votesAnchor } from "@/components/composite/composite-words";
import type { MarkKind } from "@/components/ui/mark";
import { countOf, listText, readsText } from "@/lib/core/quantity";
import { type FindingCode, readName } from "@/lib/core/words";
import type { ConditionView, DecisionView } from "@/lib/views";

/** One line of "Stands against it". Whatever does not block must be looked at and ticked before anybody signs. */
export interface AgainstItem {
  /** readable: it goes into the log as what the approver looked at; at most 80 characters */
  key: string;
  mark: MarkKind;
  title: string;
  text: string;
  /** no tick helps: the sheet stays closed until this is gone */
  blocks: boolean;
  link?: { href: string; label: string };
  /** the lead writes why it may be approved all the same */
  reasonFor?: FindingCode;
}

/** The findings as one condition line are told one by one in the other column. */
const TOLD_ONE_BY_ONE = "findings";

const short = (text: string) => (text.length <= 80 ? text : `${text.slice(0, 79)}…`);

function fromConditions(conditions: readonly ConditionView[]): AgainstItem[] {
  return conditions.filter((c) => c.state !== "met" && c.key !== TOLD_ONE_BY_ONE).map((c) => ({
    key: c.key, mark: c.state === "against" ? "block" : "wait", title: `${c.rule}.`, text: `Now: ${c.value}.`, blocks: true,
  }));
}

/** The same finding on several reads is one line. */
function fromFindings({ chip, image, open }: DecisionView): AgainstItem[] {
  const composite = compositeBehind(chip.reads, image?.sha256);
  const notes = chip.reads.filter((r) => r.stage === "before" && r.counted).flatMap((r) => r.findings.filter((f) => f.severity === "note").map((finding) => ({ read: r.number, finding })));
  const lines = new Map<string, { reads: number[]; finding: DecisionView["open"][number]["finding"] }>();
  for (const { read, finding } of [...open, ...notes]) {
    const key = `${finding.code} ${finding.message}`;
    const line = lines.get(key) ?? { reads: [], finding };
    if (read !== null) line.reads.push(read);
    lines.set(key, line);
  }
  return [...lines.values()].map(({ reads, finding }) => {
    const who = reads.length > 0 ? `${readsText(reads)}: ` : "";
    return {
      key: short(`${who}${finding.code}`), mark: finding.severity === "blocks" ? "block" : finding.severity === "reason" ? "caution" : "note",
      title: `${who}${finding.message}`, text: finding.advice, blocks: finding.severity === "blocks",
      ...(composite && VOTE_FINDINGS.includes(finding.code) ? { link: { href: `#${votesAnchor(composite)}`, label: "See the votes" } } : {}),
      ...(finding.severity === "reason" ? { reasonFor: finding.code } : {}),
    };
  });
}

function fromSetAside({ chip, image, setAside }: DecisionView): AgainstItem[] {
  return chip.reads.filter((r) => r.stage === "before" && !r.counted).map((read) => {
    const found = setAside.find((s) => s.read.id === read.id);
    const differs = !found ? "Its image is damaged or missing, so it can’t be compared." : found.differingBytes === 0
      ? "It equals the image." : `${countOf(found.differingBytes, "byte")} ${found.differingBytes === 1 ? "differs" : "differ"}, ${found.place ?? ""}.`;
    const said = read.setAside ? ` ${read.setAside.by.name}: “${read.setAside.reason}”` : "";
    const first = image?.reads[0];
    return {
      key: `${readName("before", read.number)} set aside`, mark: "aside", title: `${readName("before", read.number)} was set aside.`, text: `${differs}${said}`, blocks: false,
      ...(found && first !== undefined ? { link: { href: `/chips/${chip.id}/compare?reads=${first},${read.number}`, label: "Look at the bytes" } } : {}),
    };
  });
}

function fromCircumstances({ chip, donor, donorDiffers }: DecisionView): AgainstItem[] {
  const items: AgainstItem[] = [];
  const standing = chip.reads.filter((r) => r.stage === "before" && r.counted);
  // a composite stands for the reads that voted: those came from a reader
  const voters = new Set(standing.flatMap((r) => r.derived?.voters ?? []));
  const counted = chip.reads.filter((r) => r.stage === "before" && !r.derived && (r.counted || voters.has(r.number)));
  const readers = new Set(counted.map((r) => r.reader));
  if (counted.length > 1 && readers.size === 1) {
    items.push({ key: "One reader took every counted read", mark: "caution", title: `One reader took every ${voters.size > 0 ? "read behind the image" : "counted read"}.`, text: `${counted[0].reader}. A fault of the reader itself would repeat in all of them.`, blocks: false });
  }
  for (const one of chip.siblings.filter((sibling) => sibling.unread)) {
    items.push({ key: `${one.designator} is not read yet`, mark: "caution", title: `${one.designator} is not read yet.`, text: `It belongs together with ${chip.designator}: both are transferred. Read it before the board goes on a drive.`, blocks: false, link: { href: `/chips/${one.id}`, label: `Open ${one.designator}` } });
  }
  if (donor?.board.fit && donor.board.fit.verdict !== "fits") {
    const { fit } = donor.board;
    const reason = fit.reason ? ` A lead allowed it: “${fit.reason}”` : "";
    items.push({ key: "The donor board differs", mark: "caution", title: "The donor board is not quite the same.", text: `${fit.differences.join(" ")}${reason}`, blocks: false });
  }
  if (donorDiffers && !chip.transfers.some((t) => t.donorChipId === chip.pair?.id)) {
    items.push({ key: "The donor holds other content now", mark: "note", title: "The donor holds other content now.", text: `${countOf(donorDiffers, "byte")} ${donorDiffers === 1 ? "differs" : "differ"}. Usual for a donor of the same kind; look below where.`, blocks: false });
  }
  if (chip.supplyMillivolts === null) {
    items.push({ key: "Supply voltage unknown", mark: "caution", title: "The supply voltage isn’t known.", text: "A 1.8 V chip is destroyed by 3.3 V or 5 V. Find it out before anything is written.", blocks: false });
  } else if (donor && donor.chip.supplyMillivolts !== chip.supplyMillivolts) {
    items.push({ key: "Supply of the donor chip differs", mark: "caution", title: "The donor chip has another supply voltage on record.", text: "Check both markings: a 1.8 V chip is destroyed by 3.3 V or 5 V.", blocks: false });
  }
  if (!chip.policy.twoPersonRule) {
    items.push({ key: "Two-person rule off", mark: "note", title: "The two-person rule is switched off.", text: "Whoever took the reads may sign as well. Log, bundle and summary say so.", blocks: false });
  }
  return items;
}

export function standsFor(view: DecisionView): ConditionView[] {
  return view.chip.conditions.filter((c) => c.state === "met");
}

export function standsAgainst(view: DecisionView): AgainstItem[] {
  return [...fromConditions(view.chip.conditions), ...fromFindings(view), ...fromSetAside(view), ...fromCircumstances(view)];
}

/** What is still missing before the signature, in words; null when nothing is. */
export function stillOpen(items: readonly AgainstItem[], looked: ReadonlySet<string>, typed: { reasons: number; statement: boolean; last8: boolean }): string | null {
  const blocking = items.filter((i) => i.blocks).length;
  if (blocking > 0) return `${countOf(blocking, "line")} under “Stands against it” ${blocking === 1 ? "stands" : "stand"} in the way.`;
  const ticks = items.filter((i) => !i.blocks && !looked.has(i.key)).length;
  const missing = [
    ...(ticks > 0 ? [`${countOf(ticks, "tick")} under “Stands against it”`] : []),
    ...(typed.reasons > 0 ? [countOf(typed.reasons, "written reason")] : []),
    ...(typed.statement ? [] : ["your statement"]),
    ...(typed.last8 ? [] : ["the last 8 digits"]),
  ];
  return missing.length > 0 ? `Still open: ${listText(missing)}.` : null;
}
