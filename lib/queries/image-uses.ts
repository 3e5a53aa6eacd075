import { QueryTypes } from "sequelize";
import { type BoardRole, readName, seatingLetter, type Stage } from "@/lib/core/words";
import { connection, type Transaction } from "@/models";

/** What a stored image is kept as: the read itself, the text file it was expanded from, the report of a composite's votes. */
export type UseKind = "image" | "text" | "votes";

export interface ImageUse {
  sha256: string;
  kind: UseKind;
  readId: string;
  chipId: string;
  driveId: string;
  caseId: string;
  caseRef: string;
  /** "Case 26-0042, Drive A, Orig U12, Read 2" */
  name: string;
}

interface Row {
  sha256: Buffer;
  kind: UseKind;
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
  UNION SELECT drive_id, case_id, report FROM mine WHERE report IS NOT NULL`;

const KIND: Record<UseKind, string> = { image: "", text: ", the text file it came as", votes: ", the report of its votes" };

/** Where these images are used, in the order of cases, drives, chips and reads. */
export async function usesOfImages(digests: readonly Buffer[], tx?: Transaction): Promise<ImageUse[]> {
  if (digests.length === 0) return [];
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
    ...use, sha256: sha256.toString("hex"),
    name: `Case ${use.caseRef}, Drive ${seatingLetter(position)}, ${role === "donor" ? "Donor" : "Orig"} ${designator}, ${readName(stage, number)}${KIND[use.kind]}`,
  }));
}
