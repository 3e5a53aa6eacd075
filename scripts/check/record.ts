import type { Transaction } from "sequelize";
import { type Policy, WORKSHOP_CHAIN } from "@/lib/core/words";
import { currentPolicy } from "@/lib/queries/policy";
import { Approval, Read, Transfer, User } from "@/models";
import type { Logged, Told } from "./logged";
import type { Places } from "./places";
import type { Damage } from "./report";

/** As the first migration makes it: what holds until an entry changes it. */
const FIRST_POLICY: Policy = { reads: 3, seatings: 2, readBacks: 2, readBackSeatings: 2, twoPersonRule: true, secondFactor: false, shareDays: 90, erasureDays: 90 };

/** name, what the log says, what the row says */
type Pair = [string, unknown, unknown];

const words = (value: unknown) => (typeof value === "string" ? value : JSON.stringify(value) ?? "nothing");
/** text or list, told apart by nothing but its content */
const same = (a: unknown, b: unknown) => words(a) === words(b);
const idIn = (facts: Record<string, unknown>, name: string) => (facts[name] as { id?: unknown } | undefined)?.id;

/** Rows that the logs tell of, each against its entries: nothing that decides anything may stand in a row alone. */
export async function checkRecord(tx: Transaction, places: Places, logged: Logged): Promise<Damage[]> {
  const found: Damage[] = [];
  const say = (place: string, chain: string, told: { seq: number } | null, problem: Damage["problem"], sentence: string, sha256: string | null, pair?: Pair) =>
    found.push({ place, seq: told?.seq ?? null, problem, sentence, chain, sha256, reads: [], ...(pair ? { expected: `${pair[0]} ${words(pair[1])}`, found: `${pair[0]} ${words(pair[2])}` } : {}) });

  for (const row of await Read.findAll({ attributes: { exclude: ["findings", "derived"] }, transaction: tx, raw: true })) {
    const told = logged.told.reads.get(row.id);
    // a read that no entry stored is named where images are held against the log
    if (!told) continue;
    const place = places.reads.find((read) => read.id === row.id)?.name ?? places.chain(told.chain);
    for (const pair of [...readPairs(row, told), ...countPairs(row, logged.told.counts.get(row.id))]) {
      if (!same(pair[1], pair[2])) say(place, told.chain, pair[0] === "counted" || pair[0].startsWith("set aside") ? logged.told.counts.get(row.id) ?? told : told, "read-differs-from-log", "The read's row says something else than the log.", row.sha256.toString("hex"), pair);
    }
  }
  await checkApprovals(tx, places, logged, say);
  await checkTransfers(tx, places, logged, say);
  await checkAccounts(tx, places, logged, say);
  const policy = await currentPolicy(tx);
  for (const field of Object.keys(FIRST_POLICY) as (keyof Policy)[]) {
    const told = logged.policy.get(field);
    const expected = told ? told.value : FIRST_POLICY[field];
    if (policy[field] !== expected) say("The policy", WORKSHOP_CHAIN, told ?? null, "policy-differs-from-log", "It is another than the workshop's log says, and no entry changes it.", null, [field, expected, policy[field]]);
  }
  return found;
}

type Say = (place: string, chain: string, told: { seq: number } | null, problem: Damage["problem"], sentence: string, sha256: string | null, pair?: Pair) => void;

function readPairs(row: Read, { by, action, facts }: Told): Pair[] {
  const read = (facts.read ?? {}) as { stage?: unknown; number?: unknown };
  const pairs: Pair[] = [["chip", idIn(facts, "chip"), row.chipId], ["stage", read.stage, row.stage], ["number", read.number, row.number], ["taken by", by, row.operatorId]];
  if (action !== "read.stored") return pairs;
  return [
    ...pairs, ["seating", facts.seating, row.seating], ["transfer", facts.transfer ?? null, row.transferId], ["reader", facts.reader, row.reader], ["file name", facts.fileName, row.fileName],
    ["supply", facts.supplyMillivolts ?? null, row.supplyUnknown ? "unknown" : row.supplyMillivolts],
  ];
}

function countPairs(row: Read, last: Told | undefined): Pair[] {
  const counted = last?.action !== "read.set-aside";
  const pairs: Pair[] = [["counted", counted, Boolean(row.counted)]];
  return counted || !last ? pairs : [...pairs, ["set aside by", last.by, row.setAsideBy], ["set aside because", last.facts.reason, row.setAsideReason]];
}

async function checkApprovals(tx: Transaction, places: Places, logged: Logged, say: Say): Promise<void> {
  const here = new Set<string>();
  for (const row of await Approval.findAll({ transaction: tx, raw: true })) {
    here.add(row.id);
    const chain = places.driveOfChip.get(row.chipId) ?? "";
    const sha256 = row.sha256.toString("hex");
    const told = logged.told.approvals.get(row.id);
    const place = places.chain(chain);
    if (!told) {
      say(place, chain, null, "approval-not-in-log", "An approval stands in the database that no entry of the log gives.", sha256);
      continue;
    }
    const { facts } = told;
    if (facts.sha256 !== sha256 || told.chain !== chain) say(place, chain, told, "approval-differs-from-log", "The approval is for another image or drive than the log says.", sha256, ["image", facts.sha256, sha256]);
    const revoked = logged.told.revocations.get(row.id);
    if (logged.revoked.has(row.id) !== (row.revokedAt !== null)) {
      say(place, chain, revoked ?? told, "approval-differs-from-log", row.revokedAt ? "The approval is revoked in the database, and no entry of the log revokes it." : "The log revokes the approval, and in the database it stands.", sha256);
    }
    const pairs: Pair[] = [
      ["approved by", told.by, row.approvedBy], ["chip", idIn(facts, "chip"), row.chipId], ["donor chip", idIn(facts, "donorChip"), row.donorChipId], ["statement", facts.statement, row.statement],
      ["reasons", JSON.stringify(facts.reasons), sorted(row.reasons)], ["looked at", JSON.stringify(facts.lookedAt), row.lookedAt], ["two-person rule", facts.twoPersonRule, Boolean(row.twoPersonRule)],
      ...(revoked && row.revokedAt ? [["revoked by", revoked.by, row.revokedBy], ["cause", revoked.facts.cause, row.revokedCause], ["reason", revoked.facts.reason, row.revokedReason]] as Pair[] : []),
    ];
    for (const pair of pairs) if (!same(pair[1], pair[2])) say(place, chain, told, "approval-differs-from-log", "The approval's row says something else than the log.", sha256, pair);
  }
  for (const [id, told] of logged.told.approvals) {
    if (!here.has(id)) say(places.chain(told.chain), told.chain, told, "approval-missing", "The log says that an approval was given, and it is gone from the database.", String(told.facts.sha256));
  }
}

/** Names in the order of the canonical form, as the log has them. */
function sorted(json: string): string {
  try {
    return JSON.stringify(Object.fromEntries(Object.entries(JSON.parse(json) as object).sort(([a], [b]) => (a < b ? -1 : 1))));
  } catch {
    return json;
  }
}

async function checkTransfers(tx: Transaction, places: Places, logged: Logged, say: Say): Promise<void> {
  const here = new Set<string>();
  for (const row of await Transfer.findAll({ transaction: tx, raw: true })) {
    here.add(row.id);
    const chain = places.driveOfChip.get(row.chipId) ?? "";
    const told = logged.told.transfers.get(row.id);
    if (!told) {
      say(places.chain(chain), chain, null, "transfer-not-in-log", "A transfer stands in the database that no entry of the log records.", null);
      continue;
    }
    const { facts } = told;
    const pairs: Pair[] = [
      ["drive", told.chain, chain], ["recorded by", told.by, row.byUserId], ["approval", facts.approval, row.approvalId], ["chip", idIn(facts, "chip"), row.chipId],
      ["donor chip", idIn(facts, "donorChip"), row.donorChipId], ["kind", facts.kind, row.kind],
    ];
    for (const pair of pairs) if (!same(pair[1], pair[2])) say(places.chain(chain), chain, told, "transfer-differs-from-log", "The transfer's row says something else than the log.", null, pair);
  }
  for (const [id, told] of logged.told.transfers) if (!here.has(id)) say(places.chain(told.chain), told.chain, told, "transfer-missing", "The log records a transfer, and it is gone from the database.", null);
}

async function checkAccounts(tx: Transaction, places: Places, logged: Logged, say: Say): Promise<void> {
  const here = new Set<string>();
  for (const row of await User.findAll({ attributes: ["id", "name", "role", "disabledAt"], transaction: tx, raw: true })) {
    here.add(row.id);
    const told = logged.users.get(row.id);
    const place = `Account of ${row.name}`;
    if (!told) {
      say(place, WORKSHOP_CHAIN, null, "account-not-in-log", "The account stands in the database, and no entry of the workshop's log makes it.", null);
      continue;
    }
    for (const pair of [["name", told.name, row.name], ["role", told.role, row.role], ["switched off", told.off, row.disabledAt !== null]] as Pair[]) {
      if (!same(pair[1], pair[2])) say(place, WORKSHOP_CHAIN, told, "account-differs-from-log", "The account is another than the workshop's log says, and no entry changes it.", null, pair);
    }
  }
  for (const [id, told] of logged.users) if (!here.has(id)) say(places.chain(WORKSHOP_CHAIN), WORKSHOP_CHAIN, told, "account-differs-from-log", `The log makes an account for ${told.name}, and it is gone from the database.`, null);
}
