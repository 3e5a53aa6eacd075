import { compareIfStored } from "@/lib/commands/compare-images";
import { allow } from "@/lib/commands/refuse";
import { chipFor, driveLetter } from "@/lib/commands/place";
import { chainIsClean } from "@/lib/commands/chain-gate";
import { approvalConditions } from "@/lib/core/approval";
import type { Actor, Stage } from "@/lib/core/words";
import { readName, STAGES } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import type { ChipView, GroupView, MatrixView, StripView } from "@/lib/views";
import { Read, User } from "@/models";
import { approvalFacts } from "./chip-facts";
import { chipRecords } from "./chip-records";
import { chipState } from "./chip-state";
import { siblingsOfRecord } from "./siblings";
import { donorSummary, originalSummary, stripImage, UNPAIRED, worthDrawing } from "./chip-summary";
import { approvalView, requestView, transferView } from "./approval-views";
import { erasedOf } from "./erased-views";
import { people } from "./people";
import { currentPolicy } from "./policy";
import { readView } from "./read-view";
import { seenBy } from "./seen-by";
import { stripStack, stripView } from "./strips";
import { why } from "./why";

/** Everything the chip page shows. A donor's chip answers with its pair's state and its own reads. */
export async function chipView(actor: Actor, chipId: string): Promise<ChipView> {
  allow(actor, "case.read");
  const place = await chipFor(actor, chipId);
  const { chip, board, drive } = place;
  const [{ records }, policy, who] = [await chipRecords([drive.id]), await currentPolicy(), await people()];
  const record = records.find((r) => r.chip.id === chipId || r.donor?.chip.id === chipId) ?? null;
  const isOriginal = board.role === "original";
  const own = record && isOriginal ? [] : await Read.findAll({ where: { chipId }, order: ["stage", "number"] });
  const reads = record && isOriginal ? [...record.before, ...record.own, ...record.backs] : own;
  const state = record ? await chipState(record, policy) : UNPAIRED;
  const summary = record && isOriginal ? await originalSummary(record, state) : await donorSummary(chip, board, own, record, state);
  const unsound = record?.unsound ?? new Set<string>();
  const erased = record?.erased ?? (await erasedOf(reads.map((r) => r.sha256)));
  const drawn = worthDrawing(isOriginal ? reads.filter((r) => r.stage === "before") : own.filter((r) => r.stage === "donor"), unsound);
  const facts = record && approvalFacts(record, policy, await chainIsClean(drive.id));
  const takers = new Set(record?.before.map((r) => r.operatorId) ?? []);
  const leads = await User.findAll({ where: { role: "lead", disabledAt: null }, order: ["name"] });
  return seenBy(actor, {
    ...summary, marking: chip.marking ?? null, sizeSource: chip.sizeSource,
    drive: { id: drive.id, letter: driveLetter(drive), partNumber: drive.partNumber ?? null, model: drive.model ?? null, serial: drive.serial ?? null, encryption: drive.encryption ?? null },
    siblings: record ? await siblingsOfRecord(records, record, policy) : [],
    board: { id: board.id, role: board.role, boardNumber: board.boardNumber, revision: board.revision ?? null },
    case: { id: place.case.id, ref: place.case.ref, dueOn: place.case.dueOn ?? null, customerName: record?.customer.name ?? "", open: !place.case.closedAt },
    policy, reads: reads.map((r) => readView(r, who, !unsound.has(r.sha256.toString("hex")), erased.get(r.sha256.toString("hex")))), groups: groupsOf(reads),
    matrix: await matrixOf(reads.filter((r) => r.counted && r.stage === (isOriginal ? "before" : "donor")), unsound),
    stack: await stripStack(drawn.map(stripImage), chip.sizeBytes),
    conditions: facts ? approvalConditions(facts) : [],
    approvers: leads.filter((u) => !policy.twoPersonRule || !takers.has(u.id)).map((u) => who(u.id)),
    approval: record?.standing ? approvalView(record.standing, who) : null,
    approvals: record?.approvals.map((a) => approvalView(a, who)) ?? [],
    request: record?.request ? requestView(record.request, who) : null,
    transfers: record?.transfers.map((t) => transferView(t, who)) ?? [],
    why: record ? await why(record, policy) : UNPAIRED.sentence,
    nextSeating: Object.fromEntries(STAGES.map((s) => [s, nextSeating(reads, s)])) as Record<Stage, number>,
    receivedAt: (place.case.receivedAt ?? place.chip.createdAt).toISOString(),
  });
}

function nextSeating(reads: Read[], stage: Stage): number {
  return Math.max(0, ...reads.filter((r) => r.stage === stage).map((r) => r.seating)) + 1;
}

function groupsOf(reads: Read[]): GroupView[] {
  const groups = new Map<string, { view: GroupView; seatings: Set<number> }>();
  for (const read of reads.filter((r) => r.counted)) {
    const sha256 = read.sha256.toString("hex");
    const key = `${read.stage}:${sha256}`;
    const group = groups.get(key) ?? { view: { sha256, stage: read.stage, reads: [], seatings: 0 }, seatings: new Set<number>() };
    group.view.reads.push(read.number);
    group.seatings.add(read.seating);
    group.view.seatings = group.seatings.size;
    groups.set(key, group);
  }
  return [...groups.values()].map((g) => g.view);
}

/** Differing bytes between each two counted reads; each pair of distinct images is looked up once. */
async function matrixOf(reads: Read[], unsound: Set<string>): Promise<MatrixView> {
  const refs = reads.map((r) => ({ sha256: r.sha256.toString("hex"), sizeBytes: r.sizeBytes }));
  const cells: MatrixView["cells"] = [];
  const known = new Map<string, number | "other-size">();
  for (const [i, a] of refs.entries()) {
    const row: MatrixView["cells"][number] = [];
    for (const [j, b] of refs.entries()) {
      if (i === j) row.push(null);
      else if (a.sha256 === b.sha256) row.push(0);
      else if (a.sizeBytes !== b.sizeBytes || unsound.has(a.sha256) || unsound.has(b.sha256)) row.push("other-size");
      else {
        const pair = [a.sha256, b.sha256].sort().join();
        const differing = known.get(pair) ?? (await compareIfStored(a, b))?.differingBytes ?? "other-size";
        known.set(pair, differing);
        row.push(differing);
      }
    }
    cells.push(row);
  }
  return { reads: reads.map((r) => ({ number: r.number, name: readName(r.stage, r.number) })), cells };
}


/** What a bench script asks for (API.md): the facts of a chip without what only the page draws. */
export async function chipFlatView(actor: Actor, chipId: string) {
  const { state, stack: _stack, matrix: _matrix, thumbnail: _thumbnail, conditions: _conditions, why: _why, ...rest } = await chipView(actor, chipId);
  return { ...rest, ...state };
}

/** Strips of a chip's counted reads over a window, for the loupe and the compare page. */
export async function chipStrips(actor: Actor, chipId: string, { offset, length }: { offset: number; length?: number }): Promise<StripView> {
  allow(actor, "case.read");
  const { chip, board } = await chipFor(actor, chipId);
  const stage = board.role === "original" ? "before" : "donor";
  const reads = await Read.findAll({ where: { chipId, stage, counted: true }, order: ["number"] });
  if (offset >= chip.sizeBytes) throw new AppError("does-not-fit", "This address lies past the chip's end.");
  return stripView(worthDrawing(reads, new Set()).map(stripImage), offset, Math.min(length ?? chip.sizeBytes, chip.sizeBytes - offset));
}
