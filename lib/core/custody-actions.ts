import { z } from "zod";
import {
  AS_SENT, BOARD_ROLES, BUSES, CLOSED_KINDS, ENCRYPTIONS, ERASE_CAUSES, FORMATS, ITEM_TYPES, KEY_PURPOSES, METHODS, PHOTO_KINDS, PHOTO_SUBJECTS, readName, ROLES, SEAL_CAUSES,
  seatingLetter, SEVERITIES, SIZE_SOURCES, STAGES, TRANSFER_KINDS, WAITING_FOR,
} from "./words";

/**
 * The closed list of what a custody log can say (CUSTODY.md): for each action the shape of its facts, the sentence for
 * people, and how the page draws it. No customer's name or e-mail is a fact of the log.
 */
const sha = z.string().regex(/^[0-9a-f]{64}$/);
const crc = z.string().regex(/^[0-9a-f]{8}$/);
const uuid = z.uuid();
const words = z.string();
const size = z.int().min(0);
const optional = z.string().nullable();
const person = z.object({ id: uuid, name: words });
const party = z.object({ person: words, place: words });
/** set by append-entry: the database's clock went back; the chain's head had been turned back to this place */
const clock = { clockBehindMs: z.int().optional(), headBehind: z.int().optional() };

const change = z.object({ field: words, from: z.union([words, z.int(), z.boolean(), z.null()]), to: z.union([words, z.int(), z.boolean(), z.null()]) });
const readRef = { read: z.object({ id: uuid, stage: z.enum(STAGES), number: z.int() }), chip: z.object({ id: uuid, designator: words }) };
const chipRef = { chip: z.object({ id: uuid, designator: words }) };
const donorRef = { donorChip: z.object({ id: uuid, designator: words, boardNumber: words }) };

const name = (f: { read: { stage: (typeof STAGES)[number]; number: number } }) => readName(f.read.stage, f.read.number);
/** A finding goes on behind a colon or a semicolon: "All FF" becomes "all FF"; a name such as "Read 2" or "SHA-256" stays as it is. */
const inSentence = (finding: string) => (/^[A-Z][a-z]/.test(finding) && !/^(?:Read|Own|Back)s? \d/.test(finding) ? finding.charAt(0).toLowerCase() + finding.slice(1) : finding);
const short = (digest: string) => `${digest.slice(0, 8)}…`;
const kib = (n: number) => (n % 1024 === 0 ? `${(n / 1024).toLocaleString("en")} KiB` : `${n.toLocaleString("en")} bytes`);
/** "revision from rev C to rev D"; a value that is kept out of the log stands once, and "taken for" is a sentence by itself. */
const changes = (list: { field: string; from: unknown; to: unknown }[]) =>
  list.map(({ field, from, to }) => {
    if (from === to) return `${field} ${to}`;
    if (/^(retired|switched off)$/.test(field)) return `${to ? "now" : "no longer"} ${field}`;
    if (/^(taken|reserved) for$/.test(field)) return from === null ? `${field} ${to}` : to === null ? `no longer ${field} ${from}` : `${field} ${to}, no longer ${from}`;
    return `${field} from ${from ?? "nothing"} to ${to ?? "nothing"}`;
  }).join(", ");

/** "Placed U12 on the picture of its board": a correction of nothing but the place. */
function placed(list: { field: string; to: unknown }[], designator: string): string | null {
  if (list.length === 0 || list.some((c) => c.field !== "placeX" && c.field !== "placeY")) return null;
  return list.some((c) => c.to === null) ? `Took ${designator} off the picture of its board` : `Placed ${designator} on the picture of its board`;
}

export type EntryKind = "entry" | "differs" | "signed" | "set-aside";

interface Spec<S extends z.ZodObject> {
  facts: S;
  sentence: (facts: z.infer<S>) => string;
  kind?: EntryKind | ((facts: z.infer<S>) => EntryKind);
}
function spec<S extends z.ZodRawShape>(shape: S, sentence: (f: z.infer<z.ZodObject<S>>) => string, kind?: Spec<z.ZodObject<S>>["kind"]): Spec<z.ZodObject<S>> {
  return { facts: z.strictObject({ ...shape, ...clock }) as unknown as z.ZodObject<S>, sentence, kind };
}

export const ACTIONS = {
  "case.received": spec({ ref: words, damage: words, dueOn: optional, receivedAt: words }, (f) => `Received case ${f.ref}: ${f.damage}`),
  "drive.recorded": spec({ caseRef: words, letter: words, partNumber: optional, model: optional, serial: optional, interface: optional, caseReceivedAt: words,
    capacity: optional.optional(), made: optional.optional(), firmware: optional.optional(), encryption: z.enum(ENCRYPTIONS).nullable().optional() },
    (f) => `Recorded Drive ${f.letter} of case ${f.caseRef}${f.partNumber ? `, ${f.partNumber}` : ""}${f.serial ? `, serial ${f.serial}` : ""}${f.encryption === "yes" ? ", encrypted" : f.encryption === "suspected" ? ", encryption suspected" : ""}`),
  "drive.corrected": spec({ changes: z.array(change), reason: words }, (f) => `Corrected the drive: ${changes(f.changes)}. Reason: ${f.reason}`),
  "board.recorded": spec({ role: z.enum(BOARD_ROLES), boardNumber: words, revision: optional, controllerMarking: optional, motorDriverMarking: optional, condition: optional, dataInController: z.boolean().optional(),
    fit: z.object({ verdict: words, differences: z.array(words), reason: optional }).nullable() },
    (f) => `Recorded the ${f.role} board ${f.boardNumber}${f.revision ? ` ${f.revision}` : ""}${f.dataInController ? "; its unique data lies inside the main controller" : ""}${f.fit?.differences.length ? `; ${f.fit.differences.join("; ")}` : ""}${f.fit?.reason ? `. Reason: ${f.fit.reason}` : ""}`),
  "board.corrected": spec({ changes: z.array(change), reason: words }, (f) => `Corrected the board: ${changes(f.changes)}. Reason: ${f.reason}`),
  "chip.recorded": spec({ ...chipRef, boardRole: z.enum(BOARD_ROLES), bus: z.enum(BUSES), sizeBytes: size, sizeSource: z.enum(SIZE_SOURCES), supplyMillivolts: z.union([z.int(), z.literal("unknown")]), package: optional, marking: optional, holds: optional, idBytes: optional.optional(), sfdp: optional.optional(), needsTransfer: z.boolean() },
    (f) => `Recorded ${f.chip.designator} on the ${f.boardRole} board, ${kib(f.sizeBytes)} (${f.sizeSource}), supply ${f.supplyMillivolts === "unknown" ? "unknown" : `${f.supplyMillivolts / 1000} V`}`),
  "chip.corrected": spec({ ...chipRef, changes: z.array(change), reason: words }, (f) => placed(f.changes, f.chip.designator) ?? `Corrected ${f.chip.designator}: ${changes(f.changes)}. Reason: ${f.reason}`),
  "chip.paired": spec({ ...chipRef, ...donorRef, before: z.object({ id: uuid, designator: words }).nullable() },
    (f) => `Paired ${f.chip.designator} with donor ${f.donorChip.designator} on ${f.donorChip.boardNumber}${f.before ? ", in place of another donor chip" : ""}`),
  "read.stored": spec({ ...readRef, seating: z.int(), sizeBytes: size, crc32: crc, sha256: sha, format: words, fileName: words, reader: words, method: z.enum(METHODS).nullable(), toolVersion: optional, adapter: optional,
    supplyMillivolts: z.union([z.int(), z.literal("unknown"), z.null()]), clockKilohertz: z.int().nullable(), controllerHeld: z.boolean().nullable(), statusBits: z.literal("not read"), takenAt: optional, modifiedAt: optional, note: optional, transfer: uuid.nullable(),
    /** for text formats: the file as it came, and how it was expanded */
    source: z.object({ fileSha256: sha, fileBytes: size, base: z.int(), fill: z.int() }).optional() },
    (f) => `Stored ${name(f)}, seating ${seatingLetter(f.seating)}, ${kib(f.sizeBytes)}, SHA-256 ${short(f.sha256)}`),
  "read.judged": spec({ ...readRef, sha256: sha, engineVersion: words, findings: z.array(z.object({ code: words, severity: z.enum(SEVERITIES), message: words, measured: words.optional(), threshold: words.optional() })), equalTo: z.array(words), differsFrom: z.array(words) },
    (f) => `Judged ${name(f)}: ${[...f.findings.map((x) => inSentence(x.message.replace(/\.$/, ""))), f.equalTo.length ? `equal to ${f.equalTo.join(", ")}` : "", f.differsFrom.length ? `differs from ${f.differsFrom.join(", ")}` : ""].filter(Boolean).join("; ") || "nothing stands against it"}`,
    (f) => (f.differsFrom.length || f.findings.some((x) => x.severity !== "note") ? "differs" : "entry")),
  "read.set-aside": spec({ ...readRef, sha256: sha, reason: words }, (f) => `Set ${name(f)} aside: ${f.reason}`, "set-aside"),
  "read.counted-again": spec({ ...readRef, sha256: sha, reason: words }, (f) => `Counted ${name(f)} again: ${f.reason}`),
  "composite.made": spec({ ...readRef, sha256: sha, sizeBytes: size, crc32: crc, method: words, version: z.int(), reportSha256: sha, reason: words,
    voters: z.array(z.object({ name: words, seating: z.int(), sha256: sha })), excluded: z.array(z.object({ name: words, cause: words })),
    disputedBytes: z.int(), weak: z.int(), constructed: z.int() },
    (f) => `Made ${name(f)}, a composite of ${f.voters.map((v) => v.name).join(", ")}: ${f.disputedBytes} disputed bytes, ${f.weak} of them weak: ${f.reason}`, "differs"),
  "approval.asked": spec({ ...chipRef, sha256: sha.nullable(), message: optional }, (f) => `Asked for approval of ${f.chip.designator}${f.message ? `: ${f.message}` : ""}`),
  "approval.given": spec({ ...chipRef, ...donorRef, sha256: sha, sizeBytes: size, crc32: crc, reads: z.array(words), seatings: z.array(z.int()), statement: words, reasons: z.record(z.string(), z.string()), lookedAt: z.array(words), twoPersonRule: z.boolean(), readsTakenBy: z.array(person),
    /** the other chips of the unit and how far they were */
    siblings: z.array(z.object({ designator: words, state: words })).optional() },
    (f) => `Approved SHA-256 ${short(f.sha256)} for writing to donor ${f.donorChip.designator}${f.twoPersonRule ? "" : " (two-person rule switched off)"}: ${f.statement}`, "signed"),
  "approval.sent-back": spec({ ...chipRef, reason: words }, (f) => `Sent the approval of ${f.chip.designator} back: ${f.reason}`),
  "approval.refused": spec({ ...chipRef, sha256: sha, rule: words }, (f) => `An approval of ${f.chip.designator} was refused: ${f.rule}`, "differs"),
  "approval.revoked": spec({ ...chipRef, approval: uuid, sha256: sha, cause: words, reason: words }, (f) => `The approval of ${f.chip.designator} was revoked (${f.cause}): ${f.reason}`, "differs"),
  "image.handed-out": spec({ ...readRef, sha256: sha, sizeBytes: size, purpose: words, to: person, reason: optional, format: z.enum(FORMATS).optional() },
    (f) => `Handed out ${name(f)}, SHA-256 ${short(f.sha256)}, to ${f.to.name} (${f.purpose})${f.reason ? `: ${f.reason}` : ""}`),
  "transfer.recorded": spec({ ...chipRef, ...donorRef, transfer: uuid, approval: uuid, sha256: sha, kind: z.enum(TRANSFER_KINDS), programmer: optional, toolVersion: optional, adapter: optional, note: optional },
    (f) => (f.kind === "write" ? `Wrote SHA-256 ${short(f.sha256)} to donor ${f.donorChip.designator}` : `Moved ${f.chip.designator} to the donor board ${f.donorChip.boardNumber}`)),
  "readback.verified": spec({ ...readRef, transfer: uuid, sha256: sha }, (f) => `${name(f)} equals the approved image in every byte`, "signed"),
  "readback.differs": spec({ ...readRef, transfer: uuid, sha256: sha, approvedSha256: sha, diagnosis: words }, (f) => `${name(f)} differs from the approved image: ${f.diagnosis}`, "differs"),
  "image.found-damaged": spec({ sha256: sha, state: z.enum(["damaged", "missing"]), where: words }, (f) => `The stored image ${short(f.sha256)} is ${f.state} (found by ${f.where})`, "differs"),
  "image.found-sound": spec({ sha256: sha, where: words }, (f) => `The stored image ${short(f.sha256)} equals its digest again (found by ${f.where})`),
  "image.second-look": spec({ sha256: sha, where: words }, (f) => `The stored image ${short(f.sha256)} read once as damaged and at the second look as sound (${f.where}): look at the disk`, "differs"),
  "images.checked": spec({ images: z.int(), bytes: z.int(), damaged: z.int(), missing: z.int(), oldestBefore: optional },
    (f) => `Checked ${f.images} stored ${f.images === 1 ? "image" : "images"} of this drive: ${f.damaged + f.missing === 0 ? "each equals its digest" : `${f.damaged} damaged, ${f.missing} missing`}`,
    (f) => (f.damaged + f.missing > 0 ? "differs" : "entry")),
  "image.erased": spec({ sha256: sha, sizeBytes: size, names: z.array(words), cause: z.enum(ERASE_CAUSES), reason: words, erasure: uuid },
    (f) => `Erased the stored image ${short(f.sha256)}, ${kib(f.sizeBytes)}, kept as ${f.names.join("; ")}. Its digest stays`),
  "item.handed-over": spec({ handOver: uuid, item: z.object({ type: z.enum(ITEM_TYPES), id: uuid, name: words }), from: party, to: party, condition: words, sealNumber: optional, note: optional },
    (f) => `Handed ${f.item.name} over from ${f.from.person}, ${f.from.place}, to ${f.to.person}, ${f.to.place}: ${f.condition}${f.sealNumber ? `; seal ${f.sealNumber}` : ""}`),
  "item.received": spec({ handOver: uuid, item: z.object({ type: z.enum(ITEM_TYPES), id: uuid, name: words }), from: party, to: party, condition: words, sealNumber: optional, confirmation: optional },
    (f) => `${f.to.person} confirmed having ${f.item.name} at ${f.to.place}${f.confirmation ? `: ${f.confirmation}` : ""}`),
  "item.not-received": spec({ handOver: uuid, item: z.object({ type: z.enum(ITEM_TYPES), id: uuid, name: words }), from: party, to: party, reason: words },
    (f) => `${f.item.name.charAt(0).toUpperCase()}${f.item.name.slice(1)} did not go to ${f.to.person}; it is still with ${f.from.person}, ${f.from.place}: ${f.reason}`, "differs"),
  "request.received": spec({ caseRef: words, request: uuid, damage: words, consents: z.array(words), photos: z.int() }, (f) => `Received the request for case ${f.caseRef}: ${f.damage}`),
  "request.deletion-asked": spec({ caseRef: words, request: uuid }, (f) => `The customer of case ${f.caseRef} asked for deletion`, "differs"),
  "request.deletion-answered": spec({ caseRef: words, request: uuid, answer: words }, (f) => `Answered the customer of case ${f.caseRef}, who asked for deletion: ${f.answer}`),
  "request.link-sent": spec({ caseRef: words, request: uuid }, (f) => `Sent the customer of case ${f.caseRef} a new private link; the former one shows nothing any more`),
  "request.link-withdrawn": spec({ caseRef: words, request: uuid }, (f) => `Withdrew the private link of the customer of case ${f.caseRef}`),
  "parcel.received": spec({ caseRef: words, receipt: uuid, carrier: optional, tracking: optional, sealAsSent: z.enum(AS_SENT), sealNumber: optional, smallBoard: z.enum(AS_SENT), condition: words, accessories: optional, differs: optional },
    (f) => `Received the parcel of case ${f.caseRef}: ${f.condition}${f.sealAsSent === "no" ? "; the seal is not as it was sent" : ""}${f.differs ? `; differs from the request: ${f.differs}` : ""}`, (f) => (f.sealAsSent === "no" || f.differs ? "differs" : "entry")),
  "photo.added": spec({ photo: uuid, of: z.object({ type: z.enum(PHOTO_SUBJECTS), id: uuid, name: words }), kind: z.enum(PHOTO_KINDS), sha256: sha, sizeBytes: size, mediaType: words, caption: optional, by: z.enum(["workshop", "customer"]) },
    (f) => `Added a ${f.kind} of ${f.of.name}${f.caption ? `: ${f.caption}` : ""}, SHA-256 ${short(f.sha256)}`),
  "shelf.recorded": spec({ shelfBoard: uuid, number: words, boardNumber: words, revision: optional, origin: optional, place: optional }, (f) => `Put ${f.number} on the donor shelf: ${f.boardNumber}${f.revision ? ` ${f.revision}` : ""}`),
  "shelf.changed": spec({ shelfBoard: uuid, number: words, changes: z.array(change), reason: optional }, (f) => `Changed ${f.number} on the donor shelf: ${changes(f.changes)}${f.reason ? `. Reason: ${f.reason}` : ""}`),
  "board.taken-from-shelf": spec({ board: uuid, shelfBoard: uuid, number: words, boardNumber: words }, (f) => `Took ${f.number}, ${f.boardNumber}, from the donor shelf for this drive`),
  "case.held": spec({ caseRef: words, waitingFor: z.enum(WAITING_FOR), reason: words }, (f) => `Put case ${f.caseRef} on hold, waiting for ${f.waitingFor}: ${f.reason}`),
  "case.resumed": spec({ caseRef: words, waitingFor: z.enum(WAITING_FOR), reason: optional }, (f) => `Went on with case ${f.caseRef}${f.reason ? `: ${f.reason}` : ""}`),
  "case.corrected": spec({ caseRef: words, changes: z.array(change), reason: words }, (f) => `Corrected case ${f.caseRef}: ${changes(f.changes)}. Reason: ${f.reason}`),
  "note.added": spec({ caseRef: words, note: uuid, text: words, happenedAt: optional, lateByHours: z.int().optional(), corrects: uuid.nullable() },
    (f) => `${f.corrects ? "Corrected a note" : "Noted"}${f.lateByHours !== undefined ? ` ${f.lateByHours} h later` : ""}: ${f.text}`),
  "start-up.tested": spec({ test: uuid, spins: z.boolean(), ready: z.boolean(), reportedSerial: optional, serialMatches: z.boolean().nullable(), attempts: z.int(), note: optional },
    (f) => `Tested the start-up: ${f.spins ? "spins" : "does not spin"}, ${f.ready ? "ready" : "not ready"}${f.serialMatches === null ? "" : f.serialMatches ? ", reports the serial of its label" : `, reports another serial than its label: ${f.reportedSerial}`}`,
    (f) => (f.serialMatches === false || !f.ready ? "differs" : "entry")),
  "case.returned": spec({ caseRef: words, items: z.array(words), carrier: optional, tracking: optional, sealNumber: optional, note: optional }, (f) => `Returned ${f.items.join(", ")} of case ${f.caseRef}${f.tracking ? `, tracking ${f.tracking}` : ""}`),
  "case.closed": spec({ caseRef: words, kind: z.enum(CLOSED_KINDS), reason: optional, unverified: z.array(words), eraseOn: optional }, (f) => `Closed case ${f.caseRef} (${f.kind.replaceAll("-", " ")})${f.unverified.length ? `, not verified: ${f.unverified.join(", ")}` : ""}${f.reason ? `: ${f.reason}` : ""}`, "signed"),
  "case.reopened": spec({ caseRef: words, reason: words }, (f) => `Opened case ${f.caseRef} again: ${f.reason}`),
  "case.kept-longer": spec({ caseRef: words, until: optional, reason: words }, (f) => (f.until ? `Keeps the images of case ${f.caseRef} until ${f.until}: ${f.reason}` : `No longer keeps the images of case ${f.caseRef} beyond their day: ${f.reason}`)),
  "case.erased": spec({ caseRef: words, erasure: uuid, cause: z.enum(ERASE_CAUSES), reason: words, images: size, photos: size, bytes: size, kept: z.array(z.object({ sha256: sha, names: z.array(words) })) },
    (f) => `Erased the images of case ${f.caseRef} (${f.cause === "due" ? "their day had come" : "the customer asked for it"}): ${f.images} ${f.images === 1 ? "image" : "images"}, ${f.photos} ${f.photos === 1 ? "photo or document" : "photos and documents"}, ${f.bytes.toLocaleString("en")} bytes${f.kept.length ? `; ${f.kept.length} ${f.kept.length === 1 ? "stays" : "stay"}, used elsewhere too` : ""}. Reason: ${f.reason}`, "signed"),
  "bundle.started": spec({ caseRef: words, head: z.object({ seq: z.int(), hash: sha }) }, (f) => `Started the case bundle of ${f.caseRef}`),
  "bundle.completed": spec({ caseRef: words, tagManifestSha256: sha, upToSeq: z.int() }, (f) => `Completed the case bundle of ${f.caseRef}, tag manifest ${short(f.tagManifestSha256)}`, "signed"),
  "summary.sent": spec({ caseRef: words, share: uuid, expiresAt: words }, (f) => `Sent the verification summary of ${f.caseRef} to the customer`),
  "summary.opened": spec({ share: uuid }, () => "The customer opened the verification summary"),
  "share.withdrawn": spec({ share: uuid }, () => "Withdrew the customer's link to the summary"),
  "log.assessed": spec({ text: words }, (f) => `Assessed the log: ${f.text}`, "signed"),
  "user.created": spec({ user: person, role: z.enum(ROLES), cases: words.optional(), ends: words.optional() },
    (f) => `Made an account for ${f.user.name} (${f.role}${f.cases ? `, only ${f.cases}` : ""}${f.ends ? `, until ${f.ends}` : ""})`),
  "user.changed": spec({ user: person, changes: z.array(change) }, (f) => `Changed the account of ${f.user.name}: ${changes(f.changes)}`),
  "token.made": spec({ user: person, token: uuid, name: words }, (f) => `Made the bench token ${f.name} for ${f.user.name}`),
  "token.withdrawn": spec({ user: person, token: uuid, name: words }, (f) => `Withdrew the bench token ${f.name} of ${f.user.name}`),
  "policy.changed": spec({ changes: z.array(change) }, (f) => `Changed the policy: ${changes(f.changes)}`),
  "key.introduced": spec({ keyId: sha, purpose: z.enum(KEY_PURPOSES), publicKeyPem: words, reason: words.optional() }, (f) => `Introduced the ${f.purpose} key ${short(f.keyId)}`, "signed"),
  "seal.made": spec({ number: z.int(), sha256: sha, root: sha, chains: z.int(), keyId: sha, cause: z.enum(SEAL_CAUSES) },
    (f) => `Made seal ${f.number} over ${f.chains} ${f.chains === 1 ? "log" : "logs"}, SHA-256 ${short(f.sha256)}`, "signed"),
  "sign-in.limited": spec({ address: words, accountDigest: sha }, (f) => `Refused sign-ins from ${f.address}: too many attempts`, "differs"),
};
export type Action = keyof typeof ACTIONS;
export type Facts<A extends Action> = z.infer<(typeof ACTIONS)[A]["facts"]>;

/** The sentence and mark of an entry; an action of a later version still reads as its bare name. */
export function describe(action: string, facts: unknown): { sentence: string; kind: EntryKind } {
  const found = ACTIONS[action as Action] as Spec<z.ZodObject> | undefined;
  const parsed = found?.facts.safeParse(facts);
  if (!found || !parsed?.success) return { sentence: action, kind: "entry" };
  const kind = typeof found.kind === "function" ? found.kind(parsed.data) : found.kind ?? "entry";
  return { sentence: found.sentence(parsed.data), kind };
}
