import { createHash, randomBytes } from "node:crypto";
import { requestTransfer } from "@/lib/commands/request-transfer";
import { currentPolicy } from "@/lib/queries/policy";
import { type RequestAnswers, requestAnswers } from "@/lib/schemas/request";
import { receiptInput, type ReceiptInput } from "@/lib/schemas/receipt";

/** A request as a customer sends it, each from an address of its own. */
export async function makeRequest(more: Partial<RequestAnswers> = {}) {
  const { erasureDays } = await currentPolicy();
  const answers = requestAnswers.parse({
    name: "Edda Finch", email: "edda.finch@harrowfinch.example", returnAddress: "1 Harrow Lane", partNumber: "PN 4471-0093-B", serial: "9KQ3-70B8-D2", boardNumber: "BX 40-3179", boardRevision: "rev C",
    enclosure: "sent", lock: "none", damage: "power-surge", importance: "matters", consentOwner: "yes", consentRead: "yes", consentWrite: "yes", consentSolder: "yes", keepDays: erasureDays, signature: "Edda Finch", ...more,
  });
  return requestTransfer(answers, [], { token: randomBytes(32).toString("base64url"), address: createHash("sha256").update(randomBytes(16)).digest() });
}

/** A parcel in order, unless said otherwise. */
export function parcel(more: Partial<ReceiptInput> = {}): ReceiptInput {
  return receiptInput.parse({ sealAsSent: "yes", sealNumber: "S-4411", smallBoard: "yes", carrier: "Marsh Post", tracking: "MP 7781 20", parcelCondition: "Dry, padding whole, board in its bag", ...more });
}
