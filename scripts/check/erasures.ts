import type { Transaction } from "sequelize";
import { WORKSHOP_CHAIN } from "@/lib/core/words";
import { Case, Erasure, Request } from "@/models";
import type { StoredImage } from "./images";
import type { Logged, Told } from "./logged";
import { compare } from "./pairs";
import type { Places } from "./places";
import type { Damage } from "./report";

type Say = (place: string, chain: string | null, seq: number | null, problem: Damage["problem"], sentence: string, more?: Partial<Pick<Damage, "sha256" | "reads" | "expected" | "found">>) => void;

/**
 * No image is given up without a signed entry: an erased row needs one in the log of each drive that read it, and what the
 * logs call erased is erased by its row too. What decides when it may be (day, keeping, wish) is held against its entries.
 */
export async function checkErasures(tx: Transaction, images: readonly StoredImage[], places: Places, logged: Logged): Promise<Damage[]> {
  const found: Damage[] = [];
  const say: Say = (place, chain, seq, problem, sentence, more = {}) => void found.push({ place, chain, seq, problem, sentence, sha256: null, reads: [], ...more });
  imagesAgainstLog(images, places, logged, say);
  await erasuresAgainstLog(tx, places, logged, say);
  await casesAgainstLog(tx, logged, say);
  await wishesAgainstLog(tx, logged, say);
  return found;
}

function imagesAgainstLog(images: readonly StoredImage[], places: Places, { erased }: Logged, say: Say): void {
  for (const { sha256, erased: byRow } of images) {
    const words = [...erased].flatMap(([chain, list]) => (list.has(sha256) ? [{ chain, ...list.get(sha256)! }] : []));
    const reads = places.reads.filter((read) => read.sha256 === sha256);
    if (!byRow) {
      const word = words.find((one) => one.stands);
      if (word) say(places.chain(word.chain), word.chain, word.seq, "image-record", "The log says that this image was erased and not stored again since, and its row says otherwise.", { sha256, reads: reads.map((read) => read.name) });
      continue;
    }
    const silent = reads.filter((read) => !erased.get(read.driveId)?.get(sha256)?.stands);
    if (silent.length > 0 || !words.some((one) => one.stands)) {
      say(`Image ${sha256}`, silent[0]?.driveId ?? null, null, "image-not-in-log", "The image is erased by its row, and no entry of the log says who erased it and why.", { sha256, reads: silent.map((read) => read.name) });
    }
  }
}

async function erasuresAgainstLog(tx: Transaction, places: Places, { told }: Logged, say: Say): Promise<void> {
  const rows = await Erasure.findAll({ transaction: tx, raw: true });
  const here = new Set(rows.map((row) => row.id));
  for (const row of rows) {
    const entry = told.erasures.get(row.id);
    if (!entry) {
      say("No log", null, null, "thing-not-in-log", `An erasure stands in the database that no entry of the log records (${row.id}).`);
      continue;
    }
    const { facts } = entry;
    const kept = Array.isArray(facts.kept) ? facts.kept.length : null;
    compare([["cause", facts.cause, row.cause], ["reason", facts.reason, row.reason], ["images", facts.images, row.images], ["photos", facts.photos, row.photos], ["bytes", facts.bytes, row.bytes], ["kept", kept, listLength(row.kept)], ["erased by", entry.by, row.byUserId]],
      (expected, is) => say(places.chain(entry.chain), entry.chain, entry.seq, "thing-differs-from-log", "The erasure’s row says something else than the log.", { expected, found: is }));
  }
  for (const [id, entry] of told.erasures) if (!here.has(id)) say(places.chain(entry.chain), entry.chain, entry.seq, "thing-missing", "The log records an erasure, and it is gone from the database.");
}

function listLength(json: string): number | null {
  try {
    const list: unknown = JSON.parse(json);
    return Array.isArray(list) ? list.length : null;
  } catch {
    return null;
  }
}

async function casesAgainstLog(tx: Transaction, { cases }: Logged, say: Say): Promise<void> {
  for (const row of await Case.findAll({ attributes: ["id", "ref", "eraseOn", "keptUntil"], transaction: tx, raw: true })) {
    const known = cases.get(row.id);
    const chain = known?.chain ?? WORKSHOP_CHAIN;
    compare([["due for erasure on", known?.eraseOn, row.eraseOn], ["kept until", known?.keptUntil, row.keptUntil]],
      (expected, is) => say(`Case ${row.ref}`, chain, known?.seq ?? null, "thing-differs-from-log", "When its images may be erased is another day than the log says.", { expected, found: is }));
  }
}

async function wishesAgainstLog(tx: Transaction, { told }: Logged, say: Say): Promise<void> {
  const met = new Set([...told.erasures.values()].map((entry) => String(entry.facts.caseRef)));
  const refs = new Map((await Case.findAll({ attributes: ["id", "ref"], transaction: tx, raw: true })).map((row) => [row.id, row.ref]));
  for (const row of await Request.findAll({ attributes: ["id", "caseId", "deletionAskedAt", "deletionAnsweredAt", "deletionAnswer"], transaction: tx, raw: true })) {
    const place = `Case ${refs.get(row.caseId) ?? row.caseId}`;
    const [asked, answered] = [told.wishes.get(row.id), told.answers.get(row.id)];
    const at = (entry: Told | undefined) => [entry?.chain ?? null, entry?.seq ?? null] as const;
    if (Boolean(row.deletionAskedAt) !== Boolean(asked)) say(place, ...at(asked), "thing-differs-from-log", asked ? "The log says that the customer asked for deletion, and the database does not." : "The database says that the customer asked for deletion, and no entry of the log does.");
    const byErasure = met.has(refs.get(row.caseId) ?? "");
    if (Boolean(row.deletionAnsweredAt) !== Boolean(answered) && !(row.deletionAnsweredAt && byErasure)) say(place, ...at(answered), "thing-differs-from-log", "Whether the customer’s wish for deletion is answered is told differently by database and log.");
    else if (answered) compare([["answer", answered.facts.answer, row.deletionAnswer]], (expected, is) => say(place, ...at(answered), "thing-differs-from-log", "The answer to the customer’s wish is another than the log says.", { expected, found: is }));
  }
}
