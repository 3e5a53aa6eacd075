import { literal, Op, type Order, QueryTypes, type WhereOptions } from "sequelize";
import { driveFor } from "@/lib/commands/place";
import { allow, notFound } from "@/lib/commands/refuse";
import { readCaseRef } from "@/lib/core/case-number";
import { describe } from "@/lib/core/custody-actions";
import { bareMarking, sameMarking } from "@/lib/core/donor-fit";
import { byFit, type FittingBoard, type FittingView, readShelfNumber, type SavedContent, shelfFit, type ShelfList, shelfNumber, type ShelfPage, type ShelfState, SHELF_STATES } from "@/lib/core/shelf";
import { type Actor, readName, type Stage, WORKSHOP_CHAIN } from "@/lib/core/words";
import type { ShelfListInput } from "@/lib/schemas/shelf";
import { Board, Chip, connection, CustodyEntry, ShelfBoard } from "@/models";
import { people } from "./people";
import { chipsOfRow, shelfRows } from "./shelf-view";

const STATE: Record<ShelfState, Record<string, unknown>> = {
  "on-shelf": { takenAt: null, retiredAt: null, reservedCaseId: null },
  reserved: { takenAt: null, retiredAt: null, reservedCaseId: { [Op.ne]: null } },
  taken: { takenAt: { [Op.ne]: null } },
  retired: { takenAt: null, retiredAt: { [Op.ne]: null } },
};
const COLUMN: Record<string, string> = { number: "number", board: "boardNumber", place: "place", origin: "origin", recorded: "createdAt" };
const likeText = (text: string) => text.replace(/[\\%_]/g, (c) => `\\${c}`);

/** The shelf as a list: searched, sorted and paged by the database. It is the workshop's: a limited auditor has none. */
export async function shelfList(actor: Actor, input: Omit<ShelfListInput, "format">): Promise<ShelfList> {
  allow(actor, "shelf.read");
  const direction = input.order === "asc" ? "ASC" : "DESC";
  const order: Order = [[COLUMN[input.sort] ?? "number", COLUMN[input.sort] ? direction : "DESC"], ...(input.sort === "number" ? [] : [["number", "ASC"] as [string, string]])];
  const where = { [Op.and]: [input.state ? STATE[input.state] : {}, await matching(input.q)] } as WhereOptions;
  const { rows, count } = await ShelfBoard.findAndCountAll({ where, order, limit: input.pageSize, offset: (input.page - 1) * input.pageSize });
  const counts = Object.fromEntries(await Promise.all(SHELF_STATES.map(async (state) => [state, await ShelfBoard.count({ where: STATE[state] as WhereOptions })] as const))) as Record<ShelfState, number>;
  return { items: await shelfRows(rows), total: count, page: input.page, pageSize: input.pageSize, counts };
}

const DIGEST = /^(?:0x)?([0-9a-f]{8,64})$/i;

/** A number of the shelf, a case number, the first digits of a saved content's SHA-256, or words that stand on the board's line. */
async function matching(q: string): Promise<WhereOptions> {
  const text = q.trim();
  if (!text) return {};
  const number = readShelfNumber(text);
  if (number !== null) return { number };
  const like = { [Op.like]: `%${likeText(text)}%` };
  const reading = readCaseRef(text);
  const ref = reading.kind === "ref" ? reading.ref : null;
  const digest = DIGEST.exec(text)?.[1];
  const db = connection();
  return {
    [Op.or]: [
      ...["boardNumber", "revision", "controllerMarking", "motorDriverMarking", "origin", "condition", "place", "note", "chips"].map((column) => ({ [column]: like })),
      ...(ref ? [
        { reservedCaseId: { [Op.in]: literal(`(SELECT id FROM cases WHERE ref = ${db.escape(ref)})`) } },
        { takenBoardId: { [Op.in]: literal(`(SELECT boards.id FROM boards JOIN drives ON drives.id = boards.drive_id JOIN cases ON cases.id = drives.case_id WHERE cases.ref = ${db.escape(ref)})`) } },
      ] : []),
      ...(digest ? [{ takenBoardId: { [Op.in]: literal(`(SELECT chips.board_id FROM \`reads\` JOIN chips ON chips.id = \`reads\`.chip_id WHERE \`reads\`.stage = 'donor' AND HEX(\`reads\`.sha256) LIKE ${db.escape(`${digest.toUpperCase()}%`)})`) } }] : []),
    ],
  } as WhereOptions;
}

/** One board with what happened to it and, once a drive took it, the content that was saved from it. */
export async function shelfBoard(actor: Actor, id: string): Promise<ShelfPage> {
  allow(actor, "shelf.read");
  const row = await ShelfBoard.findByPk(id);
  if (!row) throw notFound("shelf board");
  const [[view], who, history, saved] = await Promise.all([shelfRows([row]), people(), historyOf(id), savedContent(row.takenBoardId ?? null)]);
  return { ...view, createdBy: who(row.createdBy).name, history, saved };
}

/** The board's entries of the workshop's chain, photos of it too, the newest first. */
async function historyOf(id: string): Promise<ShelfPage["history"]> {
  const rows = await CustodyEntry.findAll({
    where: { chainId: WORKSHOP_CHAIN, action: ["shelf.recorded", "shelf.changed", "photo.added"], [Op.and]: literal(`body LIKE ${connection().escape(`%"${id}"%`)}`) }, order: [["seq", "DESC"]],
  });
  return rows.flatMap((row) => {
    try {
      const body = JSON.parse(row.body.toString("utf8")) as { at: string; actor: { name: string }; action: string; facts: unknown };
      return [{ seq: row.seq, at: body.at, who: body.actor.name, sentence: describe(body.action, body.facts).sentence }];
    } catch {
      return [{ seq: row.seq, at: "", who: "unknown", sentence: "This entry can't be read: its body is damaged." }];
    }
  });
}

async function savedContent(boardId: string | null): Promise<SavedContent[]> {
  if (!boardId) return [];
  const rows = await connection().query<{ readId: string; stage: Stage; number: number; chipId: string; designator: string; sizeBytes: number; sha256: string; counted: number; storedAt: Date }>(
    `SELECT r.id AS readId, r.stage, r.number, chips.id AS chipId, chips.designator, r.size_bytes AS sizeBytes, LOWER(HEX(r.sha256)) AS sha256, r.counted, r.stored_at AS storedAt
     FROM \`reads\` r JOIN chips ON chips.id = r.chip_id WHERE chips.board_id = ? AND r.stage = 'donor' ORDER BY chips.designator, r.number`,
    { replacements: [boardId], type: QueryTypes.SELECT },
  );
  return rows.map(({ stage, number, counted, storedAt, ...row }) => ({ ...row, name: readName(stage, number), counted: Boolean(counted), storedAt: new Date(storedAt).toISOString() }));
}

const LISTED = 20;

/** Boards of the shelf with the board number of a drive's original, best first, each with all that differs. */
export async function boardsThatFit(actor: Actor, driveId: string): Promise<FittingView> {
  allow(actor, "shelf.read");
  const { drive } = await driveFor(actor, driveId);
  const original = await Board.findOne({ where: { driveId, role: "original" } });
  if (!original) return { original: null, boards: [], more: 0 };
  const needed = await Chip.findAll({ where: { boardId: original.id, needsTransfer: true }, order: ["designator"] });
  // white space anywhere: more than fits is asked for, and the rule then decides
  const pattern = [...bareMarking(original.boardNumber)].map(likeText).join("%");
  const rows = (await ShelfBoard.findAll({ where: { takenAt: null, retiredAt: null, boardNumber: { [Op.like]: pattern } }, order: ["number"] })).filter((row) => sameMarking(row.boardNumber, original.boardNumber));
  const refs = new Map((await shelfRows(rows)).map((view) => [view.id, view.reservedFor?.ref ?? null]));
  const boards = rows.map((row): FittingBoard => ({
    id: row.id, number: row.number, name: shelfNumber(row.number), boardNumber: row.boardNumber, revision: row.revision ?? null, controllerMarking: row.controllerMarking ?? null, motorDriverMarking: row.motorDriverMarking ?? null,
    chips: chipsOfRow(row), origin: row.origin ?? null, condition: row.condition ?? null, place: row.place ?? null,
    fit: shelfFit(original, needed, { ...row.get(), chips: chipsOfRow(row) }),
    reserved: !row.reservedCaseId ? "nobody" : row.reservedCaseId === drive.caseId ? "here" : "elsewhere", reservedRef: refs.get(row.id) ?? null,
  })).sort(byFit);
  return { original: { boardNumber: original.boardNumber, revision: original.revision ?? null }, boards: boards.slice(0, LISTED), more: Math.max(0, boards.length - LISTED) };
}
