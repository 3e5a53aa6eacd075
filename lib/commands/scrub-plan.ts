import { QueryTypes } from "sequelize";
import { dueAgeMs, roundMs, wholeStoreMs } from "@/lib/core/scrub-pace";
import { imagesOfDrives } from "@/lib/queries/image-uses";
import { connection, type Transaction } from "@/models";

/** What the checking keeps to: days of one rotation, bytes a second at most (null: as fast as it goes). */
export interface ScrubRate {
  days: number;
  bytesPerSecond: number | null;
}

/** Times are the database's, as texts with microseconds that compare like the times they stand for. */
export interface DriveRound {
  driveId: string;
  /** of the image that was verified longest ago */
  oldest: string;
  /** of the image that was checked longest ago; null when there was none */
  firstChecked: string | null;
  neverChecked: number;
  /** of the newest entry `images.checked` in the drive's log; "" without one */
  closed: string;
  images: number;
  bytes: number;
  damaged: number;
  missing: number;
}

export interface DueImage {
  sha256: string;
  sizeBytes: number;
  state: "sound" | "damaged" | "missing";
}

const text = (column: string) => `DATE_FORMAT(${column}, '%Y-%m-%dT%H:%i:%s.%fZ')`;

/** How every drive with images stands, or one of them. */
export async function driveRounds(only: string | null = null, tx?: Transaction): Promise<DriveRound[]> {
  const rows = await connection().query<DriveRound>(
    `SELECT u.drive_id AS driveId, ${text("MIN(COALESCE(i.checked_at, i.stored_at))")} AS oldest, ${text("MIN(i.checked_at)")} AS firstChecked,
       CAST(SUM(i.checked_at IS NULL) AS INT) AS neverChecked, COUNT(*) AS images, CAST(SUM(i.size_bytes) AS INT) AS bytes,
       CAST(SUM(i.state = 'damaged') AS INT) AS damaged, CAST(SUM(i.state = 'missing') AS INT) AS missing,
       COALESCE((SELECT CAST(JSON_VALUE(CONVERT(e.body USING utf8mb4), '$.at') AS CHAR(40)) FROM custody_entries e
         WHERE e.action = 'images.checked' AND e.chain_id = u.drive_id ORDER BY e.seq DESC LIMIT 1), '') AS closed
     FROM (${imagesOfDrives(only === null ? "TRUE" : "d.id = :only")}) u JOIN images i ON i.sha256 = u.sha256 AND i.state <> 'erased' GROUP BY u.drive_id ORDER BY oldest, driveId`,
    { replacements: { only }, transaction: tx, type: QueryTypes.SELECT },
  );
  return rows;
}

/** Every image was checked since the log's last word on it, and no entry says so yet. */
export const isToBeClosed = (round: DriveRound) => round.neverChecked === 0 && round.firstChecked !== null && round.firstChecked > round.closed;

export interface Limits {
  /** verified before this: due */
  due: string;
  /** checked since this: done in the round that is under way */
  round: string;
}

/** By the database's clock, and by how long one reading of the whole store takes. */
export async function limits({ days, bytesPerSecond }: ScrubRate): Promise<Limits> {
  const [{ bytes }] = await connection().query<{ bytes: number }>("SELECT CAST(COALESCE(SUM(size_bytes), 0) AS INT) AS bytes FROM images WHERE state <> 'erased'", { type: QueryTypes.SELECT });
  const wholeMs = bytesPerSecond === null ? 0 : wholeStoreMs(bytes, bytesPerSecond);
  const before = (ms: number) => text(`UTC_TIMESTAMP(6) - INTERVAL ${Math.round(ms)} * 1000 MICROSECOND`);
  const [row] = await connection().query<Limits>(`SELECT ${before(dueAgeMs(days, wholeMs))} AS due, ${before(roundMs(days, wholeMs))} AS round`, { type: QueryTypes.SELECT });
  return row;
}

interface Row extends Omit<DueImage, "sha256"> {
  sha256: Buffer;
}

const plain = (row: Row): DueImage => ({ ...row, sha256: row.sha256.toString("hex") });
const AGE = "COALESCE(i.checked_at, i.stored_at)";

/** The images of a drive that this round has not read yet, the one verified longest ago first. */
export async function imagesToCheck(driveId: string, { round }: Limits): Promise<DueImage[]> {
  const rows = await connection().query<Row>(
    `SELECT i.sha256, i.size_bytes AS sizeBytes, i.state FROM (${imagesOfDrives("d.id = :driveId")}) u JOIN images i ON i.sha256 = u.sha256
     WHERE i.state <> 'erased' AND (i.checked_at IS NULL OR ${text("i.checked_at")} < :round) ORDER BY ${AGE}, i.sha256`,
    { replacements: { driveId, round }, type: QueryTypes.SELECT },
  );
  return rows.map(plain);
}

/** Due images that no drive has: nobody's log can speak of them, but they are read all the same. */
export async function imagesOfNone({ due }: Limits): Promise<DueImage[]> {
  const rows = await connection().query<Row>(
    `SELECT i.sha256, i.size_bytes AS sizeBytes, i.state FROM images i
     WHERE i.state <> 'erased' AND ${text(AGE)} < :due AND i.sha256 NOT IN (SELECT u.sha256 FROM (${imagesOfDrives()}) u WHERE u.sha256 IS NOT NULL) ORDER BY ${AGE}, i.sha256`,
    { replacements: { due }, type: QueryTypes.SELECT },
  );
  return rows.map(plain);
}
