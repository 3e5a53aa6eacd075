import { z } from "zod";
import { auditAsked } from "@/lib/schemas/audit";
import { listInput } from "@/lib/schemas/case";
import { assessmentInput, policyInput } from "@/lib/schemas/policy";
import { deletionAnswerInput } from "@/lib/schemas/erasure";
import { deletionInput, requestInput, withdrawalInput } from "@/lib/schemas/request";
import { keyChangeInput, proofInput, sealFileInput, sealListInput } from "@/lib/schemas/seal";
import { passwordInput, tokenInput, userChange, userInput } from "@/lib/schemas/user";
import { custody, custodyCheck, items, list, policy, seal, shareMade } from "./answers";
import { ofThePages, type Operation, stable } from "./operation";

const AUDIT = "auditor, lead, admin";
const OWN = "whoever is signed in";

/** Logs, seals and bundles; policy, accounts, mails, requests. */
export const HOUSE_OPERATIONS: readonly Operation[] = [
  stable("GET /api/drives/{id}/custody", "staff", "Entries of a drive’s log: body word for word, hash, signature.", { answer: custody }),
  stable("GET /api/drives/{id}/custody/check", "staff", "Checks a drive’s log.", { answer: custodyCheck }),
  ofThePages("GET /api/drives/{id}/proof", "staff", "Proof that a drive’s head is under a seal.", { query: proofInput }),
  stable("POST /api/cases/{id}/bundle", "auditor, lead", "The case as a BagIt bag in a ZIP file, made while it flows.", { media: ["application/zip"], once: true }),
  stable("POST /api/cases/{id}/summary", "lead", "Makes the customer’s private link and queues its mail.", { status: 201, answer: shareMade }),
  stable("DELETE /api/shares/{id}", "lead", "Withdraws a private link."),
  ofThePages("POST /api/shares/opened", "whoever has the link", "Notes that a summary was opened.", { body: z.object({ token: z.string().max(100) }), once: true }),
  ofThePages("GET /api/audit/{list}", AUDIT, "A list of the audit pages, as JSON or as CSV.", { query: auditAsked, answer: list, media: ["text/csv"] }),
  ofThePages("POST /api/audit/checks/{id}", AUDIT, "Checks one log now."),
  ofThePages("POST /api/audit/checks/{id}/assessment", "auditor", "Records an assessment of a log.", { body: assessmentInput, status: 201 }),
  ofThePages("GET /api/seals", AUDIT, "Seals, the newest first.", { query: sealListInput, answer: list }),
  ofThePages("POST /api/seals", AUDIT, "Makes a seal.", { status: 201, answer: seal }),
  ofThePages("GET /api/seals/{number}", AUDIT, "One seal, or one of its three files.", { query: sealFileInput, answer: seal, media: ["text/plain", "application/octet-stream", "application/x-pem-file"] }),
  ofThePages("GET /api/keys", AUDIT, "The keys that sign log and seals."),
  ofThePages("POST /api/keys", "admin", "Changes a key.", { body: keyChangeInput, status: 201 }),

  stable("GET /api/policy", "staff", "How many reads, seatings and read-backs are asked for.", { answer: policy }),
  stable("PUT /api/policy", "admin", "Changes the policy.", { body: policyInput, answer: policy }),
  ofThePages("GET /api/users", "admin", "Accounts.", { answer: items }),
  ofThePages("POST /api/users", "admin", "Makes an account.", { body: userInput, status: 201, once: true }),
  ofThePages("PATCH /api/users/{id}", "admin", "Changes an account.", { body: userChange, once: true }),
  ofThePages("GET /api/mails", "admin", "The outbox.", { query: listInput, answer: list }),
  ofThePages("POST /api/mails/{id}/retry", "admin", "Tries a mail again."),
  ofThePages("GET /api/account/tokens", OWN, "Own bench tokens.", { answer: items }),
  ofThePages("POST /api/account/tokens", OWN, "Makes a bench token; it is shown this once.", { body: tokenInput, status: 201, once: true }),
  ofThePages("DELETE /api/account/tokens/{id}", OWN, "Withdraws a bench token."),
  ofThePages("POST /api/account/password", OWN, "Changes the own password.", { body: passwordInput, once: true }),
  ofThePages("POST /api/account/sessions/end", OWN, "Ends the own other sessions."),

  ofThePages("POST /api/requests", "anyone", "A customer’s request, from the public form.", { multipart: { file: "file", optional: true, fields: requestInput }, status: 201 }),
  ofThePages("POST /api/requests/deletion", "whoever has the link", "Asks for deletion.", { body: deletionInput, once: true }),
  ofThePages("POST /api/requests/withdrawal", "whoever has the link", "Withdraws a request.", { body: withdrawalInput, once: true }),
  ofThePages("POST /api/requests/{id}/link", "lead, admin", "Makes a new private link for a request and mails it."),
  ofThePages("POST /api/requests/{id}/deletion-answer", "lead, admin", "Tells a customer who asked for deletion why that can’t be done yet.", { body: deletionAnswerInput }),
  ofThePages("DELETE /api/requests/{id}/link", "lead, admin", "Ends a request’s private link."),
  stable("GET /api/openapi.json", "anyone", "This description."),
];
