import { QueryTypes } from "sequelize";
import { allow, casesOf } from "@/lib/commands/refuse";
import { scrubTroubles } from "@/lib/commands/scrub-loop";
import { scrubNow } from "@/lib/commands/scrub-round";
import { keepsUp, wholeStoreMs } from "@/lib/core/scrub-pace";
import type { Actor } from "@/lib/core/words";
import { env } from "@/lib/env";
import { MIB } from "@/lib/limits";
import type { FaultyImageView, ScrubView } from "@/lib/views";
import { connection } from "@/models";
import { imagesOfDrives, usesOfImages } from "./image-uses";

const LISTED = 200;

interface Sums {
  images: number;
  bytes: number;
  damaged: number;
  missing: number;
  neverChecked: number;
  oldestAt: string | null;
  oldestAgeMs: number | null;
}

interface Seen {
  sha256: Buffer;
  state: FaultyImageView["state"];
  sizeBytes: number;
  checkedAt: string | null;
}

const time = (column: string) => `DATE_FORMAT(${column}, '%Y-%m-%dT%H:%i:%s.%fZ')`;

/** The stored images: how they are, since when, and where those are used that are damaged or gone. */
export async function scrubState(actor: Actor): Promise<ScrubView> {
  allow(actor, "audit.read");
  const cases = casesOf(actor);
  // an empty list is a limit too
  const replacements = { cases: cases && cases.length > 0 ? cases : [""] };
  // what was erased is stored no more: it is neither overdue nor missing
  const from = cases === null ? "(SELECT * FROM images WHERE state <> 'erased') i" : `(SELECT DISTINCT sha256 FROM (${imagesOfDrives("d.case_id IN (:cases)")}) m) u JOIN images i ON i.sha256 = u.sha256 AND i.state <> 'erased'`;
  const ask = <T extends object>(sql: string) => connection().query<T>(sql, { replacements, type: QueryTypes.SELECT });
  const [sums] = await ask<Sums>(
    `SELECT COUNT(*) AS images, CAST(COALESCE(SUM(i.size_bytes), 0) AS INT) AS bytes, CAST(COALESCE(SUM(i.state = 'damaged'), 0) AS INT) AS damaged,
       CAST(COALESCE(SUM(i.state = 'missing'), 0) AS INT) AS missing, CAST(COALESCE(SUM(i.checked_at IS NULL), 0) AS INT) AS neverChecked,
       ${time("MIN(COALESCE(i.checked_at, i.stored_at))")} AS oldestAt,
       TIMESTAMPDIFF(SECOND, MIN(COALESCE(i.checked_at, i.stored_at)), UTC_TIMESTAMP(6)) * 1000 AS oldestAgeMs FROM ${from}`);
  const [last] = await ask<{ sha256: Buffer; at: string }>(`SELECT i.sha256, ${time("i.checked_at")} AS at FROM ${from} WHERE i.checked_at IS NOT NULL ORDER BY i.checked_at DESC LIMIT 1`);
  const seen = await ask<Seen>(`SELECT i.sha256, i.state, i.size_bytes AS sizeBytes, ${time("i.checked_at")} AS checkedAt FROM ${from} WHERE i.state <> 'sound' ORDER BY i.state, i.sha256 LIMIT ${LISTED}`);
  const { images, bytes, damaged, missing, neverChecked, oldestAt, oldestAgeMs } = sums;
  const { scrubDays: days, scrubMebibytesPerSecond } = env();
  const now = scrubNow();
  return {
    images, bytes, neverChecked, oldestAt, days, mebibytesPerSecond: scrubMebibytesPerSecond,
    states: { sound: images - damaged - missing, damaged, missing },
    last: last ? { sha256: last.sha256.toString("hex"), at: last.at } : null,
    hours: wholeStoreMs(bytes, scrubMebibytesPerSecond * MIB) / 3_600_000,
    ...said(days, oldestAgeMs),
    now: now.sha256 === null || cases !== null ? null : { driveId: now.driveId, sha256: now.sha256 },
    faulty: await placed(seen, cases),
  };
}

function said(days: number, oldestAgeMs: number | null): Pick<ScrubView, "state" | "sentence"> {
  if (days === 0) return { state: "off", sentence: "Reading stored images again is switched off. Set SCRUB_DAYS to have each read within so many days." };
  const trouble = scrubTroubles().images;
  if (trouble) return { state: "stopped", sentence: `Reading stored images again waits: ${trouble}` };
  if (keepsUp(days, oldestAgeMs)) return { state: "keeping-up", sentence: `Every stored image was verified within the last ${days === 1 ? "day" : `${days} days`}.` };
  return { state: "behind", sentence: `Some stored images were not verified for more than ${days === 1 ? "a day" : `${days} days`}. Leave the server running, or raise SCRUB_MEBIBYTES_A_SECOND.` };
}

async function placed(seen: Seen[], cases: readonly string[] | null): Promise<FaultyImageView[]> {
  const uses = await usesOfImages(seen.map((one) => one.sha256));
  return seen.map(({ sha256, ...rest }) => {
    const hex = sha256.toString("hex");
    const mine = uses.filter((use) => use.sha256 === hex && (cases === null || (use.caseId !== null && cases.includes(use.caseId))));
    return { ...rest, sha256: hex, uses: mine.map(({ caseId, caseRef, driveId, chipId, name }) => ({ caseId, caseRef, driveId, chipId, name })) };
  });
}
