import { literal, Op } from "sequelize";
import { driveFor, driveLetter } from "@/lib/commands/place";
import { allow, inCases } from "@/lib/commands/refuse";
import { boardName } from "@/lib/core/board-name";
import type { Actor, ItemType } from "@/lib/core/words";
import type { HandOverView, ItemView, ListView, PersonView, PlacedItem } from "@/lib/views";
import { Board, Case, Chip, Drive, HandOver, type Transaction, User } from "@/models";
import { people, type People } from "./people";

/** What of a drive can change hands: itself, its boards, their chips (a lifted one travels alone). */
export interface Item {
  type: ItemType;
  id: string;
  name: string;
}

const named = (board: Board) => `${board.role} board ${boardName({ boardNumber: board.boardNumber, revision: board.revision ?? null })}`;

export async function itemsOf(drive: Drive, tx?: Transaction): Promise<Item[]> {
  const boards = await Board.findAll({ where: { driveId: drive.id }, order: ["createdAt", "id"], transaction: tx });
  const chips = await Chip.findAll({ where: { boardId: boards.map((b) => b.id) }, order: ["createdAt", "id"], transaction: tx });
  return [
    { type: "drive", id: drive.id, name: `Drive ${driveLetter(drive)}` },
    ...boards.flatMap((board): Item[] => [
      { type: "board", id: board.id, name: named(board) },
      ...chips.filter((c) => c.boardId === board.id).map((chip): Item => ({ type: "chip", id: chip.id, name: `${chip.designator} of the ${named(board)}` })),
    ]),
  ];
}

export function handOverView(row: HandOver, who: People): HandOverView {
  return {
    id: row.id, from: { person: row.fromPerson, place: row.fromPlace }, to: { person: row.toPerson, place: row.toPlace }, toUserId: row.toUserId,
    condition: row.itemCondition, sealNumber: row.sealNumber, note: row.note, givenBy: who(row.givenBy), givenAt: row.givenAt.toISOString(),
    confirmed: row.confirmedAt ? { received: row.received === true, by: who(row.confirmedBy ?? null), at: row.confirmedAt.toISOString(), text: row.confirmation ?? null } : null,
  };
}

/** Where each item of a drive is by the last hand-over that was confirmed, and which one still waits. */
export async function itemsOfDrive(actor: Actor, driveId: string): Promise<{ items: ItemView[] }> {
  allow(actor, "case.read");
  const { drive } = await driveFor(actor, driveId);
  const [items, rows, who] = await Promise.all([itemsOf(drive), HandOver.findAll({ where: { driveId }, order: [["givenAt", "DESC"], ["id", "DESC"]] }), people()]);
  return {
    items: items.map((item): ItemView => {
      const mine = rows.filter((row) => row.itemId === item.id).map((row) => handOverView(row, who));
      return { ...item, at: mine.find((one) => one.confirmed?.received) ?? null, open: mine.find((one) => !one.confirmed) ?? null, past: mine.length };
    }),
  };
}

/** Who can confirm with an account of their own. */
export async function receivers(): Promise<PersonView[]> {
  const users = await User.findAll({ where: { role: ["technician", "lead"], disabledAt: null }, order: ["name"] });
  return users.map((user) => ({ id: user.id, name: user.name, role: user.role }));
}

/** What others gave this person and they have not confirmed, oldest first. */
export async function waitingFor(actor: Actor): Promise<{ items: { handOver: HandOverView; driveId: string; item: string }[] }> {
  allow(actor, "case.read");
  const rows = await HandOver.findAll({ where: { toUserId: actor.id, confirmedAt: null }, order: ["givenAt"] });
  const who = await people();
  const names = await namesOf(rows);
  return { items: rows.map((row) => ({ handOver: handOverView(row, who), driveId: row.driveId, item: names.get(row.itemId) ?? "An item" })) };
}

async function namesOf(rows: HandOver[]): Promise<Map<string, string>> {
  const drives = await Drive.findAll({ where: { id: [...new Set(rows.map((row) => row.driveId))] } });
  const cases = new Map((await Case.findAll({ where: { id: drives.map((d) => d.caseId) } })).map((one) => [one.id, one.ref]));
  const names = await Promise.all(drives.map(async (drive) => (await itemsOf(drive)).map((item) => [item.id, `${item.name} of case ${cases.get(drive.caseId) ?? ""}`] as const)));
  return new Map(names.flat());
}

const NOT_MOVED_ON = `NOT EXISTS (SELECT 1 FROM hand_overs AS later WHERE later.item_id = \`HandOver\`.\`item_id\`
  AND (later.given_at, later.id) > (\`HandOver\`.\`given_at\`, \`HandOver\`.\`id\`) AND COALESCE(later.received, TRUE))`;

/** Where is what right now: the latest hand-over of every item, the newest first; `q` looks in person, place, seal and case. */
export async function placedItems(actor: Actor, { q, page, pageSize }: { q: string; page: number; pageSize: number }): Promise<ListView<PlacedItem>> {
  allow(actor, "case.read");
  const like = { [Op.like]: `%${q.trim().replace(/[\\%_]/g, (c) => `\\${c}`)}%` };
  const drives = await Drive.findAll({ attributes: ["id"], where: inCases(actor, "caseId") });
  const byRef = q.trim() ? await Drive.findAll({ attributes: ["id"], include: [{ model: Case, as: "case", required: true, where: { ref: like } }] }) : [];
  const { rows, count } = await HandOver.findAndCountAll({
    where: {
      driveId: drives.map((d) => d.id),
      [Op.and]: [
        literal(NOT_MOVED_ON),
        { [Op.or]: [{ received: true }, { received: null }] },
        ...(q.trim() ? [{ [Op.or]: [{ toPerson: like }, { toPlace: like }, { sealNumber: like }, { driveId: byRef.map((d) => d.id) }] }] : []),
      ],
    },
    order: [["givenAt", "DESC"], ["id", "ASC"]], limit: pageSize, offset: (page - 1) * pageSize,
  });
  const [who, names] = [await people(), await namesOf(rows)];
  return { items: rows.map((row) => ({ driveId: row.driveId, item: names.get(row.itemId) ?? "", handOver: handOverView(row, who) })), total: count, page, pageSize };
}
