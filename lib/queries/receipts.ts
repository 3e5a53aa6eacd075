import { allow, inCases } from "@/lib/commands/refuse";
import { caseFor } from "@/lib/commands/place";
import { parseCaseRef, withCheck } from "@/lib/core/case-number";
import { answerOf, driveFromRequest } from "@/lib/core/drive-from-request";
import type { Actor } from "@/lib/core/words";
import type { ParcelView, ReceiptView, ToReceiveRow } from "@/lib/views";
import { Case, Customer, Receipt, Request } from "@/models";
import { people } from "./people";
import { seenBy } from "./seen-by";

/** What was found when the parcel came; null while there is no receipt. */
export async function receiptView(actor: Actor, caseId: string): Promise<ReceiptView | null> {
  allow(actor, "case.read");
  await caseFor(actor, caseId);
  const row = await Receipt.findOne({ where: { caseId } });
  if (!row) return null;
  const who = await people();
  return seenBy(actor, {
    carrier: row.carrier ?? null, tracking: row.tracking ?? null, sealAsSent: row.sealAsSent, sealNumber: row.sealNumber ?? null, smallBoard: row.smallBoard,
    parcelCondition: row.parcelCondition, accessories: row.accessories ?? null, differs: row.differs ?? null, by: who(row.byUserId), at: row.at.toISOString(),
  });
}

/** Cases that were asked for and are not here yet, the oldest first. */
export async function toReceive(actor: Actor): Promise<ToReceiveRow[]> {
  allow(actor, "case.read");
  const rows = await Case.findAll({ where: { receivedAt: null, closedAt: null, ...inCases(actor, "id") }, order: [["requestedAt", "ASC"], ["ref", "ASC"]] });
  const ids = rows.map((r) => r.id);
  const customers = new Map((await Customer.findAll({ where: { id: rows.map((r) => r.customerId) } })).map((c) => [c.id, c.name]));
  const answers = new Map((await Request.findAll({ where: { caseId: ids }, attributes: ["caseId", "answers"] })).map((r) => [r.caseId, answersOf(r.answers)]));
  return rows.map((row) => {
    const said = answers.get(row.id);
    const asked = driveFromRequest(said);
    return {
      caseId: row.id, caseRef: row.ref, customerName: customers.get(row.customerId) ?? "", damage: row.damage, dueOn: row.dueOn ?? null, neededBy: answerOf(said, "neededBy"),
      partNumber: asked.partNumber ?? asked.model ?? asked.serial ?? null, requestedAt: (row.requestedAt ?? new Date(0)).toISOString(),
    };
  });
}

/** The case behind a number that was scanned or typed; null when there is none. */
export async function caseByNumber(actor: Actor, number: string): Promise<{ id: string; ref: string; state: "requested" | "here" | "closed" } | null> {
  allow(actor, "case.read");
  const ref = parseCaseRef(number);
  const found = ref && (await Case.findOne({ where: { ref, ...inCases(actor, "id") } }));
  if (!found) return null;
  return { id: found.id, ref: found.ref, state: found.closedAt ? "closed" : found.receivedAt ? "here" : "requested" };
}

/** A case with what its customer said would be in the parcel. */
export async function parcelView(actor: Actor, caseId: string): Promise<ParcelView> {
  allow(actor, "case.read");
  const found = await caseFor(actor, caseId);
  const customer = (await Customer.findByPk(found.customerId))!;
  const request = await Request.findOne({ where: { caseId }, attributes: ["answers"] });
  const answers = request ? answersOf(request.answers) : null;
  return {
    caseId, caseRef: found.ref, refChecked: withCheck(found.ref), customerName: customer.name, damage: found.damage, note: found.note ?? null,
    requestedAt: found.requestedAt?.toISOString() ?? null, receivedAt: found.receivedAt?.toISOString() ?? null, closed: Boolean(found.closedAt), asked: driveFromRequest(answers), enclosure: answerOf(answers, "enclosure"), boardHidden: answerOf(answers, "boardHidden") === "yes",
    dueOn: found.dueOn ?? null, neededBy: answerOf(answers, "neededBy"),
  };
}

function answersOf(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return null;
  }
}
