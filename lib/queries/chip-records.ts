import { Op } from "sequelize";
import {
  Approval, ApprovalRequest, Board, Case, Chip, Customer, Drive, Image, Read, StartUpTest, type Transaction, Transfer,
} from "@/models";
import type { ErasedView } from "@/lib/views";
import { erasedViews } from "./erased-views";

/** Everything on record about one chip of an original board, its pair and what was done with them. */
export interface ChipRecord {
  chip: Chip;
  board: Board;
  drive: Drive;
  case: Case;
  customer: Customer;
  donor: { chip: Chip; board: Board } | null;
  /** reads of the original, by number */
  before: Read[];
  /** reads of the paired donor chip's own content, by number */
  own: Read[];
  /** read-backs of every transfer of this chip */
  backs: Read[];
  approvals: Approval[];
  standing: Approval | null;
  /** in order; the last one is the latest */
  transfers: Transfer[];
  request: ApprovalRequest | null;
  /** when the drive was tested on a donor board, in order */
  started: Date[];
  /** digests whose stored image is damaged, missing or erased */
  unsound: Set<string>;
  /** of these, the erased ones */
  erased: Map<string, ErasedView>;
}

/**
 * Records of the original's chips on these drives, in a dozen queries however many chips there are.
 * `lone` are donor chips without a pair.
 */
export async function chipRecords(driveIds: string[], tx?: Transaction): Promise<{ records: ChipRecord[]; lone: { chip: Chip; board: Board; reads: Read[] }[] }> {
  if (driveIds.length === 0) return { records: [], lone: [] };
  const at = { transaction: tx };
  const drives = await Drive.findAll({ where: { id: driveIds }, order: ["position"], ...at });
  const boards = await Board.findAll({ where: { driveId: driveIds }, order: ["createdAt"], ...at });
  const cases = await Case.findAll({ where: { id: drives.map((d) => d.caseId) }, ...at });
  const customers = await Customer.findAll({ where: { id: cases.map((c) => c.customerId) }, ...at });
  const chips = await Chip.findAll({ where: { boardId: boards.map((b) => b.id) }, ...at });
  chips.sort((a, b) => a.designator.localeCompare(b.designator, "en", { numeric: true }));
  const ids = chips.map((c) => c.id);
  const reads = await Read.findAll({ where: { chipId: ids }, order: ["stage", "number"], ...at });
  const approvals = await Approval.findAll({ where: { chipId: ids }, order: ["givenAt"], ...at });
  const transfers = await Transfer.findAll({ where: { chipId: ids }, order: ["at"], ...at });
  const requests = await ApprovalRequest.findAll({ where: { chipId: ids }, order: ["askedAt"], ...at });
  const images = await Image.findAll({ attributes: ["sha256", "state", "erasedAt", "erasedCause"], where: { state: { [Op.ne]: "sound" } }, ...at });
  const tests = await StartUpTest.findAll({ where: { driveId: driveIds }, attributes: ["driveId", "at"], order: [["at", "ASC"]], ...at });
  const unsound = new Set(images.map((i) => i.sha256.toString("hex")));
  const erased = erasedViews(images);

  const boardOf = new Map(boards.map((b) => [b.id, b]));
  const driveOf = new Map(drives.map((d) => [d.id, d]));
  const caseOf = new Map(cases.map((c) => [c.id, c]));
  const customerOf = new Map(customers.map((c) => [c.id, c]));
  const of = <T>(list: T[], belongs: (item: T) => boolean) => list.filter(belongs);

  const records: ChipRecord[] = [];
  const lone: { chip: Chip; board: Board; reads: Read[] }[] = [];
  for (const chip of chips) {
    const board = boardOf.get(chip.boardId)!;
    if (board.role === "donor") {
      if (!chip.pairedWithId) lone.push({ chip, board, reads: of(reads, (r) => r.chipId === chip.id) });
      continue;
    }
    const drive = driveOf.get(board.driveId)!;
    const found = caseOf.get(drive.caseId)!;
    const donorChip = chips.find((c) => c.pairedWithId === chip.id);
    const mine = of(transfers, (t) => t.chipId === chip.id);
    const given = of(approvals, (a) => a.chipId === chip.id);
    const asked = of(requests, (r) => r.chipId === chip.id);
    records.push({
      chip, board, drive, case: found, customer: customerOf.get(found.customerId)!,
      donor: donorChip ? { chip: donorChip, board: boardOf.get(donorChip.boardId)! } : null,
      before: of(reads, (r) => r.chipId === chip.id && r.stage === "before"),
      own: donorChip ? of(reads, (r) => r.chipId === donorChip.id && r.stage === "donor") : [],
      backs: of(reads, (r) => r.stage === "after" && mine.some((t) => t.id === r.transferId)),
      approvals: given, standing: given.find((a) => !a.revokedAt) ?? null, transfers: mine, request: asked.at(-1) ?? null,
      started: of(tests, (t) => t.driveId === drive.id).map((t) => t.at), unsound, erased,
    });
  }
  return { records, lone };
}

/** The record of the original's chip that this chip is, or is paired with. */
export async function recordOfChip(chipId: string, tx?: Transaction): Promise<ChipRecord | null> {
  const chip = await Chip.findByPk(chipId, { transaction: tx });
  const board = chip && (await Board.findByPk(chip.boardId, { transaction: tx }));
  if (!chip || !board) return null;
  const originalId = board.role === "original" ? chip.id : chip.pairedWithId;
  if (!originalId) return null;
  const { records } = await chipRecords([board.driveId], tx);
  return records.find((r) => r.chip.id === originalId) ?? null;
}
