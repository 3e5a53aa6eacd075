import { Op, QueryTypes } from "sequelize";
import { driveLetter, placeOfChip } from "@/lib/commands/place";
import { allow, casesOf, inCases } from "@/lib/commands/refuse";
import { readTitle } from "@/lib/core/derived";
import { crc32Hex } from "@/lib/core/digest";
import type { Actor } from "@/lib/core/words";
import type { CaseRow, FindHit } from "@/lib/views";
import { Board, Case, connection, Drive, Read } from "@/models";
import { caseList, caseRows } from "./cases";
import { seenBy } from "./seen-by";

const MOST = 100;
const WITHIN = "AND chip_id IN (SELECT chips.id FROM chips JOIN boards ON boards.id = chips.board_id JOIN drives ON drives.id = boards.drive_id WHERE drives.case_id IN (?))";

/** Where an image is known, by 8 or more leading hex digits of its SHA-256 or by its CRC-32. Nothing is stored by asking. */
export async function findDigest(actor: Actor, digest: string): Promise<{ hits: FindHit[] }> {
  allow(actor, "find.ask");
  const only = casesOf(actor);
  if (only?.length === 0) return { hits: [] };
  const ids = await connection().query<{ id: string }>(
    `SELECT id FROM \`reads\` WHERE (HEX(sha256) LIKE ? ${digest.length === 8 ? "OR crc32 = ?" : ""}) ${only ? WITHIN : ""} ORDER BY stored_at DESC LIMIT ${MOST}`,
    { replacements: [`${digest.toUpperCase()}%`, ...(digest.length === 8 ? [Number.parseInt(digest, 16)] : []), ...(only ? [only] : [])], type: QueryTypes.SELECT },
  );
  const reads = await Read.findAll({ where: { id: ids.map((r) => r.id) }, order: [["storedAt", "DESC"]] });
  return { hits: await Promise.all(reads.map(hitOf)) };
}

async function hitOf(read: Read): Promise<FindHit> {
  const { chip, board, drive, case: found } = await placeOfChip(read.chipId);
  return {
    readId: read.id, readName: readTitle({ stage: read.stage, number: read.number, derived: read.derived }), chipId: chip.id, designator: chip.designator, boardRole: board.role, caseId: found.id,
    caseRef: found.ref, driveLetter: driveLetter(drive), crc32: crc32Hex(read.crc32), sha256: read.sha256.toString("hex"), counted: read.counted,
  };
}

const DIGEST = /^(0x)?([0-9a-f]{8,64})$/i;

/** The search field: a case number with or without its check character, a serial, part or board number, a customer, or a digest. */
export async function findText(actor: Actor, q: string): Promise<{ cases: CaseRow[]; hits: FindHit[] }> {
  allow(actor, "find.ask");
  const text = q.trim();
  if (!text) return { cases: [], hits: [] };
  const digest = DIGEST.exec(text)?.[2].toLowerCase();
  const hits = digest ? (await findDigest(actor, digest)).hits : [];
  const { items } = await caseList(actor, { q: text, sort: "", order: "desc", page: 1, pageSize: 50 });
  const like = { [Op.like]: `%${text.replace(/[\\%_]/g, (c) => `\\${c}`)}%` };
  const boards = await Board.findAll({
    where: { boardNumber: like }, attributes: ["driveId"], limit: 200, include: [{ model: Drive, as: "drive", required: true, attributes: [], where: inCases(actor, "caseId") }],
  });
  const drives = await Drive.findAll({ where: { id: boards.map((b) => b.driveId) }, attributes: ["caseId"] });
  const known = new Set(items.map((c) => c.id));
  const more = await Case.findAll({ where: { id: [...new Set(drives.map((d) => d.caseId))].filter((id) => !known.has(id)) }, limit: 50 });
  return { cases: [...items, ...(await seenBy(actor, await caseRows(more)))], hits };
}
