import type { z } from "zod";

/** One call of the interface, as its description and the help page tell of it. */
export interface Operation {
  method: "GET" | "POST" | "PUT" | "PATCH" | "DELETE";
  /** "/api/chips/{id}" */
  path: string;
  /** stays as it is: scripts may rely on it. The others serve the pages and may change with them */
  stable: boolean;
  who: string;
  summary: string;
  query?: z.ZodType;
  body?: z.ZodType;
  /** multipart/form-data: files under this name, and fields */
  multipart?: { file: string; optional?: true; fields?: z.ZodType };
  status: number;
  /** the JSON answer; left out where only the pages need it */
  answer?: z.ZodType;
  /** what the answer is when it isn't JSON, or may be something else beside it */
  media?: readonly string[];
  /** takes no Idempotency-Key: the answer holds a secret or a file, and a repeated call is a new one */
  once?: true;
}

type Details = Partial<Pick<Operation, "query" | "body" | "multipart" | "status" | "answer" | "media" | "once">>;
type Call = `${Operation["method"]} /${string}`;

/** `stable("GET /api/chips/{id}", "staff", "One chip.", {…})` */
export function stable(call: Call, who: string, summary: string, details: Details = {}): Operation {
  const [method, path] = call.split(" ") as [Operation["method"], string];
  return { method, path, stable: true, who, summary, status: 200, ...details };
}

export function ofThePages(call: Call, who: string, summary: string, details: Details = {}): Operation {
  return { ...stable(call, who, summary, details), stable: false };
}
