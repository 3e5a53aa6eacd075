import { howToCheck, opening, parties, whereItStands } from "./about-section";
import { chips } from "./chip-section";
import { drives } from "./drive-section";
import { custodyLogs, handOuts } from "./log-section";
import { promises } from "./promise-section";
import type { ReportFacts } from "./report-facts";
import { driveName, shortHash } from "./report-words";
import { Sheet } from "./sheet";

/** More heads than these do not fit on a foot; chapter 1 has them all. */
const FOOT_HEADS = 2;

/**
 * The report of a case bundle as a PDF of A4 pages. The same facts give the same bytes. Heavy work yields between
 * blocks, so that other requests have their turn.
 */
export async function makeReport(facts: ReportFacts): Promise<Buffer> {
  const { record } = facts;
  const heads = record.drives.map((drive) => `${driveName(drive)}: entry ${drive.logUpTo.seq}, ${shortHash(drive.logUpTo.hash)}`);
  const sheet = new Sheet({
    title: `Case ${record.ref}: report of the case bundle`, workshop: record.workshop, ref: record.ref, madeAt: new Date(record.madeAt),
    foot: heads.length <= FOOT_HEADS ? `Head of ${heads.join("; ")}` : `Head of ${heads[0]}; heads of all ${heads.length} logs in chapter 1`,
  });
  await sheet.breathe();
  opening(sheet, facts);
  await sheet.breathe();
  await whereItStands(sheet, facts);
  howToCheck(sheet, facts);
  await sheet.breathe();
  parties(sheet, facts);
  await sheet.breathe();
  await drives(sheet, facts);
  await chips(sheet, facts);
  await handOuts(sheet, facts);
  await custodyLogs(sheet, facts);
  promises(sheet, facts);
  return sheet.finish();
}
