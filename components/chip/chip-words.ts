import type { MarkKind } from "@/components/ui/mark";
import { listText, readsText } from "@/lib/core/quantity";
import { type Bus, type ChipStateCode, type Finding, type Method, readName, type Stage } from "@/lib/core/words";
import type { ChipSummary, ChipView, ReadBackView, ReadView } from "@/lib/views";

const STATE_MARK: Record<ChipStateCode, MarkKind> = {
  verified: "ok", failed: "block", written: "run", approved: "done", unread: "wait", "reads-disagree": "block",
  held: "block", "needs-reads": "run", ready: "wait",
};

export function stateMark(state: ChipStateCode): MarkKind {
  return STATE_MARK[state];
}

/** What the board panel says: a chip that is kept for reference waits for nobody once its reads agree. */
export function headState(chip: ChipView): { mark: MarkKind; label: string } {
  if (isKept(chip) && chip.state.state === "ready") return { mark: "ok", label: "Kept for reference" };
  return { mark: STATE_MARK[chip.state.state], label: chip.state.label };
}

/** No transfer of this original's chip is planned, and none was made. */
export const isKept = (chip: ChipView): boolean => chip.boardRole === "original" && !chip.needsTransfer && chip.approvals.length === 0 && chip.transfers.length === 0;

/** The verdict speaks of the reads, not of the work left: agreeing reads are in order although nobody has signed. */
export function verdictMark(chip: ChipView): MarkKind {
  if (chip.state.state === "ready") return "ok";
  if (chip.state.state === "held" && !openFindings(chip).some((f) => f.severity === "blocks")) return "caution";
  return STATE_MARK[chip.state.state];
}

/** Findings on counted reads of the original that stand against an approval. */
export function openFindings(chip: ChipView): Finding[] {
  return chip.reads.filter((r) => r.stage === "before" && r.counted).flatMap((r) => r.findings).filter((f) => f.severity !== "note");
}

export function findingMark(finding: Finding): MarkKind {
  if (finding.code === "verified") return "ok";
  return finding.severity === "blocks" ? "block" : finding.severity === "reason" ? "caution" : "note";
}

const BUS_WORD: Record<Bus, string> = { spi: "SPI", i2c: "I2C", microwire: "Microwire", other: "Other bus" };

/** "SPI, 4 Mbit" */
export function kindText(bus: Bus, sizeBytes: number): string {
  const bits = sizeBytes * 8;
  const size = bits % 1_048_576 === 0 ? `${bits / 1_048_576} Mbit` : bits % 1024 === 0 ? `${bits / 1024} Kbit` : `${bits} bits`;
  return `${BUS_WORD[bus]}, ${size}`;
}

/** Millivolts as "3.3 V". */
export function supplyText(millivolts: number | "unknown" | null): string {
  return typeof millivolts === "number" ? `${millivolts / 1000} V` : "supply unknown";
}

export const METHOD_WORD: Record<Method, string> = { "in-place": "clip on the board", lifted: "chip lifted", socket: "chip in a socket" };

export function nameOf(read: Pick<ReadView, "stage" | "number">): string {
  return readName(read.stage, read.number);
}

/** "Read 3", "Reads 1 and 3", "Back 1 and 2" */
export function namesOf(stage: Stage, numbers: readonly number[]): string {
  return readsText(numbers, readName(stage, 0).split(" ")[0]);
}

/** A read taken by this person would leave nobody who may approve. */
export const leavesNobody = (chip: Pick<ChipView, "policy" | "approvers">, userId: string): boolean => chip.policy.twoPersonRule && chip.approvers.length === 1 && chip.approvers[0].id === userId;

/** Said where the two-person rule leaves nobody: the ways out, and whose they are. */
export const NOBODY_LEFT = "No other lead has an account here: an admin makes one under Users. Where somebody works alone, an admin may switch the two-person rule off under Policy.";

/** "Mira Hollis and Tomas Brandl" without repeats */
export function peopleText(names: readonly string[]): string {
  return listText([...new Set(names)]);
}

/** Counted reads of one stage that hold the same image as this one, itself left out. */
export function twins(read: ReadView, reads: readonly ReadView[]): ReadView[] {
  return reads.filter((r) => r.id !== read.id && r.chipId === read.chipId && r.stage === read.stage && r.counted && r.sha256 === read.sha256);
}

/** Counted reads of one stage outside the largest agreeing group; all of them when no two agree. */
export function oddReads(reads: readonly ReadView[], stage: Stage): ReadView[] {
  const counted = reads.filter((r) => r.stage === stage && r.counted);
  const sizes = new Map<string, number>();
  for (const read of counted) sizes.set(read.sha256, (sizes.get(read.sha256) ?? 0) + 1);
  if (sizes.size < 2) return [];
  const most = Math.max(...sizes.values());
  const largest = [...sizes].filter(([, n]) => n === most);
  const winner = largest.length === 1 ? largest[0][0] : null;
  return counted.filter((r) => r.sha256 !== winner);
}

/** The stored read that carries the approved image. */
export function approvedRead(chip: ChipView): ReadView | null {
  return chip.reads.find((r) => r.stage === "before" && r.counted && r.sha256 === chip.approval?.sha256) ?? null;
}

/** Where the bytes of this page are compared: after a write the approved image with the read-back that differs, or the latest. */
export function compareHref(chip: Pick<ChipView, "id">, readBack: ReadBackView | null, at?: number): string {
  const back = readBack ? readBack.backs.find((one) => one.differs !== 0) ?? readBack.backs.at(-1) : undefined;
  const query = new URLSearchParams({ ...(back ? { back: String(back.number) } : {}), ...(at === undefined ? {} : { at: String(at) }) }).toString();
  return `/chips/${readBack?.chipId ?? chip.id}/compare${query ? `?${query}` : ""}`;
}

/** Changes with every approval, transfer and read-back: what the read-backs' strips depend on. */
export function readBackKey(chip: Pick<ChipView, "approval" | "transfers" | "reads">): string {
  const backs = chip.reads.filter((r) => r.stage === "after").map((r) => `${r.id}${r.counted ? "" : " aside"}`);
  return [chip.approval?.id, chip.transfers.at(-1)?.id, ...backs].join();
}

/** The chip that is written to, or the moved one: where read-backs belong. */
export function readBackChipId(chip: ChipView): string | null {
  return chip.transfers.at(-1)?.donorChipId ?? null;
}

/** "SPI, 4 Mbit, SOIC-8, 3.3 V" */
export function chipKind(chip: Pick<ChipSummary, "bus" | "sizeBytes" | "package" | "supplyMillivolts">): string {
  // a package's name is read in one piece: "TSSOP-8" with a hyphen that doesn't break
  return [kindText(chip.bus, chip.sizeBytes), chip.package?.replaceAll("-", "\u2011"), supplyText(chip.supplyMillivolts)].filter(Boolean).join(", ");
}
