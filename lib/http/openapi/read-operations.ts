import { approvalInput, approvalRequestInput, transferInput } from "@/lib/schemas/approval";
import { bytesInput, comparedInput, comparisonInput, compositeInput, findBytesInput, findInput, handOutInput, readFields, reasonInput, stripInput } from "@/lib/schemas/read";
import { approvalMade, chip, comparison, found, made, read, readsStored, transferMade } from "./answers";
import { ofThePages, type Operation, stable } from "./operation";

const BENCH = "technician, lead";
const BINARY = ["application/octet-stream"];

/** Reads, approval and transfer. */
export const READ_OPERATIONS: readonly Operation[] = [
  stable("GET /api/chips/{id}", "staff", "One chip: state, sentence, reads, groups of equal reads, pair, approvals, transfers.", { answer: chip }),
  ofThePages("GET /api/chips/{id}/view", "staff", "Everything that the chip’s page draws."),
  ofThePages("GET /api/chips/{id}/strips", "staff", "Image strips of the counted reads.", { query: stripInput }),
  stable("POST /api/chips/{id}/reads", BENCH, "Stores 1 to 16 reads, all or none; sha256, modifiedAt and takenAt once for each file, in their order.", { multipart: { file: "file", fields: readFields }, status: 201, answer: readsStored }),
  stable("GET /api/chips/{id}/comparison", "staff", "Two reads compared byte by byte, with what the difference looks like.", { query: comparisonInput, answer: comparison }),
  ofThePages("GET /api/chips/{id}/comparison/differences", "staff", "The ranges in which two or three reads differ.", { query: comparedInput, media: ["text/csv"] }),
  stable("POST /api/chips/{id}/composite", "lead", "Makes a composite by majority.", { body: compositeInput, status: 201, answer: read }),
  stable("POST /api/chips/{id}/approval-request", BENCH, "Asks for approval.", { body: approvalRequestInput, status: 201, answer: made }),
  stable("POST /api/chips/{id}/approval", "lead", "Approves an image for a donor’s chip; 409 says which rule stands against it.", { body: approvalInput, status: 201, answer: approvalMade }),
  stable("POST /api/chips/{id}/sending-back", "lead", "Sends a request for approval back.", { body: reasonInput }),
  stable("POST /api/approvals/{id}/revocation", "lead", "Takes an approval back.", { body: reasonInput }),
  stable("POST /api/approvals/{id}/transfer", BENCH, "Records that the image was written or the chip moved.", { body: transferInput, status: 201, answer: transferMade }),
  stable("GET /api/reads/{id}/bytes", "staff", "A window of at most 64 KiB of a read; no hand-out.", { query: bytesInput, media: BINARY }),
  ofThePages("GET /api/reads/{id}/find", "staff", "Where a read holds these bytes or this text next.", { query: findBytesInput }),
  stable("POST /api/reads/{id}/download", "technician: approved image or donor’s own content; lead, auditor: any, with a reason", "The image as a file, with its digest in Repr-Digest; written into the log first.", { body: handOutInput, media: BINARY, once: true }),
  stable("POST /api/reads/{id}/set-aside", "technician: own reads; lead", "Sets a read aside.", { body: reasonInput }),
  stable("POST /api/reads/{id}/count-again", "technician: own reads; lead", "Counts a read again.", { body: reasonInput }),
  ofThePages("GET /api/reads/{id}/votes", "staff", "The votes behind a composite."),
  stable("GET /api/find", "staff", "Where a digest is known.", { query: findInput, answer: found }),
  stable("POST /api/find", "staff", "Where this file is known; nothing of it is stored.", { multipart: { file: "file" }, answer: found, once: true }),
];
