import { boardCorrection, boardInput } from "@/lib/schemas/board";
import { caseInput, caseListInput } from "@/lib/schemas/case";
import { chipCorrection, chipInput } from "@/lib/schemas/chip";
import { closingInput, reopeningInput, returnInput } from "@/lib/schemas/closing";
import { driveCorrection, driveInput, driveLook } from "@/lib/schemas/drive";
import { erasureInput, keepingInput } from "@/lib/schemas/erasure";
import { confirmationInput, handOverInput } from "@/lib/schemas/hand-over";
import { caseCorrection, holdInput, noteInput, resumeInput } from "@/lib/schemas/note";
import { photoInput } from "@/lib/schemas/photo";
import { receiptInput } from "@/lib/schemas/receipt";
import { importFields, shelfChange, shelfInput, shelfListInput, takingInput } from "@/lib/schemas/shelf";
import { startUpInput } from "@/lib/schemas/start-up";
import { caseAnswer, caseMade, health, items, list, made, photos } from "./answers";
import { ofThePages, type Operation, stable } from "./operation";

const BENCH = "technician, lead";
const CSV = ["text/csv"];
const photoRoutes = (things: string, thing: string): Operation[] => [
  (things === "shelf-boards" ? ofThePages : stable)(`GET /api/${things}/{id}/photos`, "staff", `Photos and documents of a ${thing}.`, { answer: photos }),
  (things === "shelf-boards" ? ofThePages : stable)(`POST /api/${things}/{id}/photos`, BENCH, `Adds photos or documents to a ${thing}: JPEG, PNG, WebP or PDF, at most 20 MiB each.`, { status: 201, multipart: { file: "file" } }),
];

/** Cases, drives, boards, chips, and what surrounds them. */
export const WORK_OPERATIONS: readonly Operation[] = [
  stable("GET /api/health", "anyone", "Whether database and store answer.", { answer: health }),
  stable("GET /api/cases", "staff", "List of cases.", { query: caseListInput, answer: list }),
  stable("POST /api/cases", BENCH, "Records a case.", { body: caseInput, status: 201, answer: caseMade }),
  stable("GET /api/cases/{id}", "staff", "One case with drives, boards, chips and their states.", { answer: caseAnswer }),
  ofThePages("PATCH /api/cases/{id}", BENCH, "Corrects a case, with a reason.", { body: caseCorrection }),
  stable("POST /api/cases/{id}/drives", BENCH, "Records a drive: at least one of part number, model and serial.", { body: driveInput, status: 201, answer: made }),
  ofThePages("GET /api/cases/{id}/drive-warnings", BENCH, "What speaks against label data while it is typed.", { query: driveLook }),
  ofThePages("POST /api/cases/{id}/receipt", BENCH, "Records what came in the parcel.", { body: receiptInput, status: 201 }),
  ofThePages("POST /api/cases/{id}/hold", BENCH, "Puts a case on hold.", { body: holdInput }),
  ofThePages("POST /api/cases/{id}/resumption", BENCH, "Takes a case off hold.", { body: resumeInput }),
  ofThePages("GET /api/cases/{id}/notes", "staff", "Notes of a case."),
  ofThePages("POST /api/cases/{id}/notes", BENCH, "Adds a note.", { body: noteInput, status: 201 }),
  ofThePages("POST /api/cases/{id}/return", BENCH, "Records what went back.", { body: returnInput, status: 201 }),
  ofThePages("POST /api/cases/{id}/closing", "lead", "Closes a case.", { body: closingInput }),
  ofThePages("POST /api/cases/{id}/reopening", "lead", "Reopens a closed case.", { body: reopeningInput }),
  ofThePages("GET /api/cases/{id}/erasure", "staff", "What is stored of a closed case, how long yet, and what an erasure took."),
  ofThePages("POST /api/cases/{id}/erasure", "lead, admin", "Erases the images of a closed case, for good. Digests stay.", { body: erasureInput }),
  ofThePages("POST /api/cases/{id}/keeping", "lead, admin", "Keeps the images of a closed case longer; without a day that keeping ends.", { body: keepingInput }),
  ofThePages("GET /api/bench", "staff", "The bench: chips and what to do next.", { answer: items }),

  ofThePages("GET /api/drives/{id}", "staff", "One drive."),
  stable("PATCH /api/drives/{id}", BENCH, "Corrects a drive, with a reason.", { body: driveCorrection }),
  stable("POST /api/drives/{id}/boards", BENCH, "Records a board.", { body: boardInput, status: 201, answer: made }),
  ofThePages("POST /api/drives/{id}/start-up-test", BENCH, "Records a start-up test.", { body: startUpInput, status: 201 }),
  ofThePages("GET /api/drives/{id}/items", "staff", "Where drive, boards and lifted chips are."),
  stable("POST /api/drives/{id}/hand-over", BENCH, "Records a hand-over; the receiver confirms it.", { body: handOverInput, status: 201, answer: made }),
  ofThePages("POST /api/hand-overs/{id}/confirmation", BENCH, "Confirms a hand-over, or says that it did not arrive.", { body: confirmationInput }),
  stable("PATCH /api/boards/{id}", BENCH, "Corrects a board, with a reason.", { body: boardCorrection }),
  stable("POST /api/boards/{id}/chips", BENCH, "Records a chip.", { body: chipInput, status: 201, answer: made }),
  stable("PATCH /api/chips/{id}", BENCH, "Corrects a chip or its pair, with a reason.", { body: chipCorrection }),

  ...photoRoutes("cases", "case"), ...photoRoutes("drives", "drive"), ...photoRoutes("boards", "board"), ...photoRoutes("chips", "chip"), ...photoRoutes("shelf-boards", "board of the shelf"),
  stable("GET /api/photos/{id}", "staff", "The original of a photo or document as a file; with reduced, a copy without metadata.", { query: photoInput, media: ["image/jpeg", "image/png", "image/webp", "application/pdf"] }),

  ofThePages("GET /api/shelf-boards", "staff", "The donor shelf, as JSON or CSV.", { query: shelfListInput, answer: list, media: CSV }),
  ofThePages("POST /api/shelf-boards", BENCH, "Records a board of the shelf.", { body: shelfInput, status: 201 }),
  ofThePages("POST /api/shelf-boards/import", BENCH, "Reads a CSV file of the shelf; with try, only says what it would do.", { multipart: { file: "file", fields: importFields } }),
  ofThePages("GET /api/shelf-boards/{id}", "staff", "One board of the shelf."),
  ofThePages("PATCH /api/shelf-boards/{id}", BENCH, "Changes a board of the shelf.", { body: shelfChange }),
  ofThePages("POST /api/shelf-boards/{id}/taking", BENCH, "Takes a board from the shelf for a drive.", { body: takingInput, status: 201 }),
];
