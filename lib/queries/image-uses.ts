import { QueryTypes } from "sequelize";
import { type BoardRole, type PhotoKind, readName, seatingLetter, type Stage } from "@/lib/core/words";
import { connection, type Transaction } from "@/models";

/** What stored bytes are kept as: the read itself, the text file it was expanded from, the report of a composite's votes, a photo or document. */
export type UseKind = "image" | "text" | "votes" | PhotoKind;

export interface ImageUse {
  sha256: string;
  kind: UseKind;
  /** null for a photo */
  readId: string | null;
  /** null for a photo of something else than a chip */
  chipId: string | null;
  /** null for a photo of a case without a drive, or of a board on the shelf: nobody's log can speak of it */
  driveId: string | null;
  /** null for a board on the shelf */
  caseId: string | null;
  caseRef: string | null;
  /** a photo of a board on the shelf, taken for a drive since or not: the workshop's own */
  shelf: boolean;
  /** "Case 26-0042, Drive A, Orig U12, Read 2" */
  name: string;
}

interface Row {
  sha256: Buffer;
  kind: Exclude<UseKind, PhotoKind>;
  readId: string;
  chipId: string;
  driveId: string;
  caseId: string;
  caseRef: string;
  stage: Stage;
  number: number;
  designator: string;
  role: BoardRole;
  position: number;
}

/** No text column goes into the unions: the database would keep them on its disk. */
const reportOf = (derived: string) => `CAST(UNHEX(JSON_VALUE(${derived}, '$.reportSha256')) AS BINARY(32))`;

/** Every stored image and the read it is kept for, three ways. `only` limits each branch by the digest's column. */
const branches = (only: (digest: string) => string) => `
  SELECT sha256, id, 'image' AS kind FROM \`reads\` WHERE ${only("sha256")}
  UNION ALL SELECT source_sha256, id, 'text' FROM \`reads\` WHERE source_sha256 IS NOT NULL AND ${only("source_sha256")}
  UNION ALL SELECT ${reportOf("derived")}, id, 'votes' FROM \`reads\` WHERE derived IS NOT NULL AND ${only(reportOf("derived"))}`;

/** Distinct images of each drive: columns `drive_id`, `case_id`, `sha256`; `where` may speak of the drive as `d`. */
export const imagesOfDrives = (where = "TRUE") => `
  WITH mine AS (
    SELECT b.drive_id, d.case_id, r.sha256, r.source_sha256, ${reportOf("r.derived")} AS report FROM drives d
    JOIN boards b ON b.drive_id = d.id JOIN chips c ON c.board_id = b.id JOIN \`reads\` r ON r.chip_id = c.id WHERE ${where})
  SELECT drive_id, case_id, sha256 FROM mine
  UNION SELECT drive_id, case_id, source_sha256 FROM mine WHERE source_sha256 IS NOT NULL
  UNION SELECT drive_id, case_id, report FROM mine WHERE report IS NOT NULL
  UNION SELECT d.id, d.case_id, p.sha256 FROM drives d JOIN photos p ON p.case_id = d.case_id AND p.subject_type = 'case' WHERE ${where}
  UNION SELECT d.id, d.case_id, p.sha256 FROM drives d JOIN photos p ON p.subject_type = 'drive' AND p.subject_id = d.id WHERE ${where}
  UNION SELECT d.id, d.case_id, p.sha256 FROM drives d JOIN boards b ON b.drive_id = d.id JOIN photos p ON p.subject_type = 'board' AND p.subject_id = b.id WHERE ${where}
  UNION SELECT d.id, d.case_id, p.sha256 FROM drives d JOIN boards b ON b.drive_id = d.id JOIN chips c ON c.board_id = b.id
    JOIN photos p ON p.subject_type = 'chip' AND p.subject_id = c.id WHERE ${where}
  UNION SELECT d.id, d.case_id, p.sha256 FROM drives d JOIN boards b ON b.drive_id = d.id JOIN shelf_boards s ON s.taken_board_id = b.id
    JOIN photos p ON p.subject_type = 'shelf-board' AND p.subject_id = s.id WHERE ${where}`;

const KIND: Record<Row["kind"], string> = { image: "", text: ", the text file it came as", votes: ", the report of its votes" };

/** Where these images are used: as reads in the order of cases, drives, chips and reads, then as photos. */
export async function usesOfImages(digests: readonly Buffer[], tx?: Transaction): Promise<ImageUse[]> {
  if (digests.length === 0) return [];
  return [...(await usesByReads(digests, tx)), ...(await usesByPhotos(digests, tx))];
}

async function usesByReads(digests: readonly Buffer[], tx?: Transaction): Promise<ImageUse[]> {
  const rows = await connection().query<Row>(
    `SELECT u.sha256, u.kind, r.id AS readId, c.id AS chipId, d.id AS driveId, k.id AS caseId, k.ref AS caseRef,
       r.stage, r.number, c.designator, b.role, d.position
     FROM (${branches((digest) => `${digest} IN (:digests)`)}) u
     JOIN \`reads\` r ON r.id = u.id JOIN chips c ON c.id = r.chip_id JOIN boards b ON b.id = c.board_id
     JOIN drives d ON d.id = b.drive_id JOIN cases k ON k.id = d.case_id
     ORDER BY k.ref, d.position, c.designator, r.stage, r.number, u.kind`,
    { replacements: { digests }, transaction: tx, type: QueryTypes.SELECT },
  );
  return rows.map(({ stage, number, designator, role, position, sha256, ...use }) => ({
    ...use, sha256: sha256.toString("hex"), shelf: false,
    name: `Case ${use.caseRef}, Drive ${seatingLetter(position)}, ${role === "donor" ? "Donor" : "Orig"} ${designator}, ${readName(stage, number)}${KIND[use.kind]}`,
  }));
}

interface PhotoRow {
  sha256: Buffer;
  kind: PhotoKind;
  shelfNumber: number | null;
  chipId: string | null;
  designator: string | null;
  role: BoardRole | null;
  driveId: string | null;
  position: number | null;
  caseId: string | null;
  caseRef: string | null;
}

/** A photo of a whole case is used once for each of its drives: each drive's log can speak of it. */
async function usesByPhotos(digests: readonly Buffer[], tx?: Transaction): Promise<ImageUse[]> {
  const rows = await connection().query<PhotoRow>(
    `SELECT p.sha256, p.kind, s.number AS shelfNumber, c.id AS chipId, c.designator, b.role, d.id AS driveId, d.position, k.id AS caseId, k.ref AS caseRef
     FROM photos p LEFT JOIN shelf_boards s ON p.subject_type = 'shelf-board' AND s.id = p.subject_id
     LEFT JOIN chips c ON p.subject_type = 'chip' AND c.id = p.subject_id
     LEFT JOIN boards b ON b.id = COALESCE(c.board_id, s.taken_board_id, IF(p.subject_type = 'board', p.subject_id, NULL))
     LEFT JOIN drives d ON d.id = b.drive_id OR (p.subject_type = 'drive' AND d.id = p.subject_id) OR (p.subject_type = 'case' AND d.case_id = p.case_id)
     LEFT JOIN cases k ON k.id = COALESCE(d.case_id, p.case_id)
     WHERE p.sha256 IN (:digests) ORDER BY k.ref, d.position, c.designator, p.stored_at, p.id`,
    { replacements: { digests }, transaction: tx, type: QueryTypes.SELECT },
  );
  return rows.map(({ shelfNumber, position, designator, role, sha256, ...use }) => {
    const board = role === "donor" ? "Donor" : "Orig";
    const place = use.caseRef === null ? [`Shelf board ${shelfNumber}`] : [`Case ${use.caseRef}`, ...(position === null ? [] : [`Drive ${seatingLetter(position)}`]), ...(role ? [designator ? `${board} ${designator}` : `${board} board`] : [])];
    return { ...use, sha256: sha256.toString("hex"), readId: null, shelf: shelfNumber !== null, name: [...place, use.kind].join(", ") };
  });
}

/**
 * Digests of what a case keeps for its customer: the images of its reads with their texts and reports of votes, and its
 * photos and documents. Photos of a board that came from the shelf are the workshop's own.
 */
export async function imagesOfCase(caseId: string, tx?: Transaction): Promise<Buffer[]> {
  const rows = await connection().query<{ sha256: Buffer }>(
    `WITH mine AS (
       SELECT r.sha256, r.source_sha256, ${reportOf("r.derived")} AS report FROM drives d
       JOIN boards b ON b.drive_id = d.id JOIN chips c ON c.board_id = b.id JOIN \`reads\` r ON r.chip_id = c.id WHERE d.case_id = :caseId)
     SELECT sha256 FROM mine UNION SELECT source_sha256 FROM mine WHERE source_sha256 IS NOT NULL UNION SELECT report FROM mine WHERE report IS NOT NULL
     UNION SELECT sha256 FROM photos WHERE case_id = :caseId`,
    { replacements: { caseId }, transaction: tx, type: QueryTypes.SELECT },
  );
  return rows.map((row) => row.sha256).sort(Buffer.compare);
}
