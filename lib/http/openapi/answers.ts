import { z } from "zod";
import { CHIP_STATES, FINDING_CODES, FORMATS, SEVERITIES, STAGES } from "@/lib/core/words";

/** What the stable calls answer. Answers may carry more than is named here; what is named is there. */
const id = z.uuid();
const sha256 = z.string().regex(/^[0-9a-f]{64}$/);
const crc32 = z.string().regex(/^[0-9a-f]{8}$/);
const time = z.string();
const range = z.object({ start: z.int(), length: z.int() });

export const made = z.looseObject({ id });
export const health = z.looseObject({ status: z.literal("ok") });
export const caseMade = z.looseObject({ id, ref: z.string() });
export const list = z.looseObject({ items: z.array(z.looseObject({})), total: z.int(), page: z.int(), pageSize: z.int() });
export const items = z.looseObject({ items: z.array(z.looseObject({})) });

export const finding = z.looseObject({
  code: z.enum(FINDING_CODES), severity: z.enum(SEVERITIES), message: z.string(), advice: z.string(), measured: z.string().optional(), threshold: z.string().optional(),
  ranges: z.array(range).optional(),
});
export const read = z.looseObject({
  id, number: z.int(), stage: z.enum(STAGES), seating: z.int(), sizeBytes: z.int(), crc32, sha256, counted: z.boolean(), findings: z.array(finding),
  format: z.enum(FORMATS), fileName: z.string(), reader: z.string(), operator: z.looseObject({ id, name: z.string() }), takenAt: time.nullable(), storedAt: time,
  setAside: z.looseObject({ reason: z.string(), at: time }).nullable(),
});
const state = { state: z.enum(CHIP_STATES), label: z.string(), sentence: z.string() };
export const readsStored = z.looseObject({ reads: z.array(read), chip: z.looseObject(state) });
export const chip = z.looseObject({
  id, designator: z.string(), sizeBytes: z.int(), ...state, policy: z.looseObject({}), reads: z.array(read),
  groups: z.array(z.looseObject({ sha256, stage: z.enum(STAGES), reads: z.array(z.int()), seatings: z.int() })),
  pair: z.looseObject({ id }).nullable(), approvals: z.array(z.looseObject({ id, sha256 })), transfers: z.array(z.looseObject({ id })),
});
export const comparison = z.looseObject({
  equal: z.boolean(), differingBytes: z.int(), differingBits: z.object({ zeroToOne: z.int(), oneToZero: z.int() }), ranges: z.array(range), truncated: z.literal(true).optional(),
  diagnosis: z.looseObject({ code: z.string(), message: z.string(), advice: z.string(), confidence: z.enum(["certain", "likely", "unsure"]) }),
});
export const caseAnswer = z.looseObject({ id, ref: z.string(), state: z.enum(["requested", "open", "closed"]), drives: z.array(z.looseObject({ id, boards: z.array(z.looseObject({ id })) })) });
export const approvalMade = z.looseObject({ id, sha256 });
export const transferMade = z.looseObject({ id, donorChipId: id });
export const photos = z.looseObject({ photos: z.array(z.looseObject({ id, sha256, sizeBytes: z.int() })) });
export const custody = z.looseObject({ entries: z.array(z.looseObject({ seq: z.int(), body: z.string(), hash: sha256, signature: z.string(), keyId: z.string() })) });
export const custodyCheck = z.looseObject({
  ok: z.boolean(), entries: z.int(), head: z.looseObject({ seq: z.int(), hash: sha256 }), findings: z.array(z.looseObject({ seq: z.int().nullable(), problem: z.string() })),
});
export const found = z.looseObject({ hits: z.array(z.looseObject({ readId: id, chipId: id, designator: z.string(), sha256, crc32 })) });
export const policy = z.looseObject({ reads: z.int(), seatings: z.int(), readBacks: z.int(), readBackSeatings: z.int(), twoPersonRule: z.boolean() });
export const seal = z.looseObject({ number: z.int(), text: z.string(), signature: z.string(), keyId: z.string() });
export const shareMade = z.looseObject({ share: z.looseObject({ id }) });
