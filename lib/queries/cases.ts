import { col, fn, Op, type Order, type WhereOptions } from "sequelize";
import { allow, inCases, notFound } from "@/lib/commands/refuse";
import { caseFor } from "@/lib/commands/place";
import { readCaseRef, withCheck } from "@/lib/core/case-number";
import { dueDay } from "@/lib/core/erasure";
import type { Actor } from "@/lib/core/words";
import { env } from "@/lib/env";
import type { CaseListInput } from "@/lib/schemas/case";
import type { CaseRow, CaseState, CaseView, HoldView, ListView } from "@/lib/views";
import { Board, Case, CustodyHead, Customer, Drive, Share } from "@/models";
import { boardViews } from "./boards";
import { driveFactsView, warningsOf } from "./drives";
import { casesDue } from "./erasure";
import { chipRecords } from "./chip-records";
import { chipState } from "./chip-state";
import { people } from "./people";
import { currentPolicy } from "./policy";
import { seenBy } from "./seen-by";
import { shareView } from "./share-view";
import { dayIn } from "./workshop-day";

const COLUMN: Record<string, string> = { ref: "ref", due: "dueOn" };
/** a request without a parcel stands where it came in */
const CAME = fn("COALESCE", col("Case.received_at"), col("Case.requested_at"));
const STATES: Record<CaseState, WhereOptions> = {
  requested: { receivedAt: null, closedAt: null }, open: { receivedAt: { [Op.ne]: null }, closedAt: null }, closed: { closedAt: { [Op.ne]: null } },
};

/** The cases as a list: searched, sorted and paged by the database. */
export async function caseList(actor: Actor, input: CaseListInput): Promise<ListView<CaseRow>> {
  allow(actor, "case.read");
  const direction = input.order === "asc" ? "ASC" : "DESC";
  const byName = [{ model: Customer, as: "customer" }, "name", direction] as const;
  const column = COLUMN[input.sort];
  const order: Order = [input.sort === "customer" ? [...byName] : column ? [column, direction] : [CAME, input.sort === "received" ? direction : "DESC"], ["ref", "DESC"]];
  const { rows, count } = await Case.findAndCountAll({
    where: { [Op.and]: [inCases(actor, "id"), await matching(actor, input.q), input.state === "erasure-due" ? { id: await casesDue(actor) } : input.state ? STATES[input.state] : {}] }, include: [{ model: Customer, as: "customer", required: true }], order,
    limit: input.pageSize, offset: (input.page - 1) * input.pageSize, distinct: true,
  });
  return { items: await seenBy(actor, await caseRows(rows)), total: count, page: input.page, pageSize: input.pageSize };
}

/** Case number, customer, damage, or a drive's part number, model or serial. */
async function matching(actor: Actor, q: string): Promise<WhereOptions> {
  const text = q.trim();
  if (!text) return {};
  const reading = readCaseRef(text);
  if (reading.kind === "ref") return { ref: reading.ref };
  const like = { [Op.like]: `%${text.replace(/[\\%_]/g, (c) => `\\${c}`)}%` };
  const drives = await Drive.findAll({ attributes: ["caseId"], where: { ...inCases(actor, "caseId"), [Op.or]: [{ partNumber: like }, { model: like }, { serial: like }] }, limit: 1000 });
  return { [Op.or]: [{ ref: like }, { damage: like }, { "$customer.name$": like }, { id: drives.map((d) => d.caseId) }] } as WhereOptions;
}

function caseState(row: Case): CaseState {
  if (row.closedAt) return "closed";
  return row.receivedAt ? "open" : "requested";
}

/** Whom a case waits for; the bench says it too. */
export function holdOf({ waitingFor, waitingSince, holdReason }: Case): HoldView | null {
  return waitingFor && waitingSince ? { waitingFor, since: waitingSince.toISOString(), reason: holdReason ?? "" } : null;
}

export async function caseRows(rows: Case[]): Promise<CaseRow[]> {
  const customers = new Map((await Customer.findAll({ where: { id: rows.map((r) => r.customerId) } })).map((c) => [c.id, c]));
  const drives = await Drive.findAll({ where: { caseId: rows.map((r) => r.id) }, order: ["position"] });
  const { records } = await chipRecords(drives.map((d) => d.id));
  const inside = await Board.findAll({ where: { driveId: drives.map((d) => d.id), role: "original", dataInController: true }, attributes: ["driveId"] });
  const noChip = new Set(inside.map((board) => drives.find((d) => d.id === board.driveId)?.caseId));
  const policy = await currentPolicy();
  const states = await Promise.all(records.filter((r) => r.chip.needsTransfer).map(async (record) => ({ caseId: record.case.id, designator: record.chip.designator, ...(await chipState(record, policy)) })));
  return rows.map((row) => ({
    id: row.id, ref: row.ref, customerName: customers.get(row.customerId)?.name ?? "", damage: row.damage, dueOn: row.dueOn ?? null,
    partNumbers: [...new Set(drives.filter((d) => d.caseId === row.id).map((d) => d.partNumber ?? d.model ?? d.serial))].join(", "),
    receivedAt: row.receivedAt?.toISOString() ?? null, requestedAt: row.requestedAt?.toISOString() ?? null, state: caseState(row), eraseOn: dueDay({ eraseOn: row.eraseOn ?? null, keptUntil: row.keptUntil ?? null }), erasedOn: row.erasedAt ? dayIn(env().timeZone, row.erasedAt) : null,
    chips: states.filter((s) => s.caseId === row.id).map(({ state, label, designator }) => ({ state, label, designator })), noChipToMove: noChip.has(row.id),
  }));
}

export async function caseView(actor: Actor, id: string): Promise<CaseView> {
  allow(actor, "case.read");
  const found = await caseFor(actor, id);
  const customer = await Customer.findByPk(found.customerId);
  if (!customer) throw notFound("case");
  const who = await people();
  const drives = await Drive.findAll({ where: { caseId: id }, order: ["position"] });
  const heads = new Map((await CustodyHead.findAll({ where: { chainId: drives.map((d) => d.id) } })).map((h) => [h.chainId, h.seq]));
  const boards = await boardViews(drives.map((d) => d.id));
  const shares = await Share.findAll({ where: { caseId: id }, order: [["createdAt", "DESC"]] });
  return seenBy(actor, {
    id, ref: found.ref, refChecked: withCheck(found.ref), state: caseState(found), closedReason: found.closedReason ?? null,
    customer: { name: customer.name, email: customer.email, phone: customer.phone ?? null, contact: customer.contact ?? null, company: customer.company ?? null, returnAddress: customer.returnAddress ?? null },
    hold: holdOf(found),
    damage: found.damage, note: found.note ?? null, dueOn: found.dueOn ?? null, receivedAt: found.receivedAt?.toISOString() ?? null, requestedAt: found.requestedAt?.toISOString() ?? null, createdBy: found.createdBy ? who(found.createdBy) : null,
    drives: await Promise.all(drives.map(async (d) => ({
      ...driveFactsView(d), warnings: await warningsOf(actor, d), boards: boards.get(d.id) ?? [], custodyEntries: heads.get(d.id) ?? 0,
    }))),
    shares: shares.map((s) => shareView(s, who)),
  });
}
