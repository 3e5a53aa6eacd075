import type { Problem } from "@/lib/http/send";
import { Refusal } from "@/lib/http/send";
import type { ReadView, StateView } from "@/lib/views";
import type { Running } from "./digest-file";

/** What is sent with a file; empty texts are left out. Names are those of API.md. */
export type UploadFields = Record<string, string>;

export interface StoredReads {
  reads: ReadView[];
  chip: StateView;
}

const BROKEN: Problem = { status: 0, title: "The connection broke", detail: "The connection broke off before the answer came. Send the file again; if it was stored after all, it is not stored twice." };

/** One file, one call. XMLHttpRequest, because fetch tells nothing of how far an upload has come. */
export function sendFile(chipId: string, file: File, fields: UploadFields, key: string, onProgress: (sent: number) => void): Running<StoredReads> {
  const request = new XMLHttpRequest();
  const result = new Promise<StoredReads>((resolve, reject) => {
    const body = new FormData();
    // fields first, so that the server can refuse before the bytes have come
    for (const [name, value] of Object.entries(fields)) if (value !== "") body.append(name, value);
    body.append("modifiedAt", new Date(file.lastModified).toISOString());
    body.append("file", file, file.name);
    request.open("POST", `/api/chips/${chipId}/reads`);
    request.setRequestHeader("idempotency-key", key);
    request.responseType = "json";
    // the multipart frame adds some hundred bytes: never show more than the file has
    request.upload.addEventListener("progress", (event) => onProgress(Math.min(event.loaded, file.size)));
    request.addEventListener("load", () => {
      if (request.status === 201 || request.status === 200) resolve(request.response as StoredReads);
      else reject(new Refusal(problemOf(request)));
    });
    request.addEventListener("error", () => reject(new Refusal(BROKEN)));
    request.addEventListener("abort", () => reject(new Refusal({ ...BROKEN, title: "Stopped", detail: "Sending was stopped. Nothing was stored." })));
    request.send(body);
  });
  return { result, stop: () => request.abort() };
}

function problemOf(request: XMLHttpRequest): Problem {
  const body = request.response as Partial<Problem> | null;
  const wrong = body?.errors?.map((e) => e.message).join(" ");
  return {
    status: request.status,
    title: body?.title ?? "Something went wrong",
    detail: [body?.detail, wrong].filter(Boolean).join(" ") || "The server gave no reason. Send the file again; if it stays, tell whoever runs Twinread.",
    errors: body?.errors,
  };
}
