import type { Transaction } from "sequelize";
import { HandOver, Photo, Share } from "@/models";
import type { Logged, Told } from "./logged";
import { compare, type Pair } from "./pairs";
import type { Places } from "./places";
import type { Damage } from "./report";

const facts = (told: Told, name: string) => (told.facts[name] ?? {}) as Record<string, unknown>;

function photoPairs(told: Told, row: Photo): Pair[] {
  const of = facts(told, "of");
  return [
    ["of", of.type, row.subjectType], ["of the one with id", of.id, row.subjectId], ["kind", told.facts.kind, row.kind], ["digest", told.facts.sha256, row.sha256.toString("hex")],
    ["size", told.facts.sizeBytes, row.sizeBytes], ["type", told.facts.mediaType, row.mediaType], ["caption", told.facts.caption, row.caption],
    ["added by", told.facts.by === "customer" ? null : told.by, row.byUserId],
  ];
}

function handOverPairs(told: Told, row: HandOver, end: Told | undefined): Pair[] {
  const [item, from, to] = [facts(told, "item"), facts(told, "from"), facts(told, "to")];
  const received = end ? end.action === "item.received" : null;
  return [
    ["drive", told.chain, row.driveId], ["item", item.type, row.itemType], ["item's id", item.id, row.itemId], ["from", from.person, row.fromPerson], ["from the place", from.place, row.fromPlace],
    ["to", to.person, row.toPerson], ["to the place", to.place, row.toPlace], ["condition", told.facts.condition, row.itemCondition], ["seal number", told.facts.sealNumber, row.sealNumber],
    ["note", told.facts.note, row.note], ["given by", told.by, row.givenBy], ["received", received, row.received === null ? null : Boolean(row.received)],
    ["confirmed by", end?.by, row.confirmedBy], ["confirmation", end && (received ? end.facts.confirmation : end.facts.reason), row.confirmation],
  ];
}

const sharePairs = (told: Told, row: Share, end: Told | undefined): Pair[] => [
  ["sent by", told.by, row.createdBy], ["ends", told.facts.expiresAt, row.expiresAt.toISOString()], ["withdrawn", end !== undefined, row.withdrawnAt !== null],
];

/** Photos, hand-overs and the customers' links against their entries. */
export async function checkAround(tx: Transaction, places: Places, { told }: Logged): Promise<Damage[]> {
  const found: Damage[] = [];
  const hold = <Row extends { id: string }>(noun: string, rows: Row[], entries: ReadonlyMap<string, Told>, pairsOf: (entry: Told, row: Row) => Pair[]) => {
    const say = (problem: Damage["problem"], sentence: string, entry: Told | undefined, pair: Pick<Damage, "expected" | "found"> = {}) => found.push({
      place: entry ? places.chain(entry.chain) : "No log", seq: entry?.seq ?? null, problem, sentence, chain: entry?.chain ?? null, sha256: null, reads: [],
      ...pair,
    });
    const here = new Set(rows.map((row) => row.id));
    for (const row of rows) {
      const entry = entries.get(row.id);
      if (!entry) say("thing-not-in-log", `A ${noun} stands in the database that no entry of the log records (${row.id}).`, undefined);
      else compare(pairsOf(entry, row), (expected, is) => say("thing-differs-from-log", `The ${noun}'s row says something else than the log.`, entry, { expected, found: is }));
    }
    for (const [id, entry] of entries) if (!here.has(id)) say("thing-missing", `The log records a ${noun}, and it is gone from the database.`, entry);
  };
  hold("photo", await Photo.findAll({ transaction: tx }), told.photos, photoPairs);
  hold("hand-over", await HandOver.findAll({ transaction: tx }), told.handOvers, (entry, row) => handOverPairs(entry, row, told.confirmations.get(row.id)));
  hold("customer's link", await Share.findAll({ transaction: tx }), told.shares, (entry, row) => sharePairs(entry, row, told.withdrawals.get(row.id)));
  return found;
}
