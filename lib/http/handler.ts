import { z } from "zod";
import type { Actor } from "@/lib/core/words";
import { actorOf } from "@/lib/auth/actor";
import { AppError, type FieldError } from "@/lib/errors";
import { MAX_JSON_BYTES } from "@/lib/limits";
import { once, requestHash } from "./idempotency";
import { checkOrigin } from "./origin";
import { answerTo } from "./problem";

type Params = Record<string, string>;
interface Context {
  params: Promise<Params>;
}

export interface Call<I> {
  actor: Actor;
  input: I;
  params: Params;
  request: Request;
}

interface Options<I> {
  /** shape of the JSON body, or of the query for GET */
  input?: z.ZodType<I>;
  /** status of the answer to a change, 200 when left out */
  status?: number;
  /** `anyone`: no sign-in asked; the actor is then nobody. `new-password`: open to who still has a one-time password */
  open?: "anyone" | "new-password";
  /** the answer holds a secret that is shown once: it is kept nowhere, so a repeated request is a new one */
  secret?: true;
}

/**
 * What every route is made of: who asks, where from, is the input well formed, run, answer. `run` gets plain values and
 * returns a plain object (sent as JSON) or a Response of its own. It throws AppError; nothing is caught below here.
 */
export function handler<I = undefined>(options: Options<I>, run: (call: Call<I>) => Promise<unknown>) {
  return async (request: Request, context: Context): Promise<Response> => {
    try {
      const params = (await context.params) ?? {};
      const actor = await actorOf(request, options.open);
      checkOrigin(request);
      for (const [name, value] of Object.entries(params)) {
        if (name === "id" && !z.uuid().safeParse(value).success) throw new AppError("not-found", "There is nothing under this address. Check the link.");
      }
      if (request.method === "GET" || request.method === "HEAD") {
        const query = Object.fromEntries(new URL(request.url).searchParams);
        const input = options.input ? parse(options.input, query) : (undefined as I);
        return toResponse(await run({ actor, input, params, request }), 200);
      }
      const text = options.input ? await readJson(request) : "";
      const input = options.input ? parse(options.input, jsonOf(text)) : (undefined as I);
      const path = new URL(request.url).pathname;
      let own: Response | undefined;
      const answer = await once(
        actor.id, `${request.method} ${path}`, options.secret ? null : request.headers.get("idempotency-key"), requestHash([request.method, path, text]), options.status ?? 200,
        async () => {
          const result = await run({ actor, input, params, request });
          if (result instanceof Response) {
            own = result;
            return null;
          }
          return result;
        },
      );
      return own ?? toResponse(answer.body, answer.status);
    } catch (error) {
      return answerTo(error);
    }
  };
}

function toResponse(body: unknown, status: number): Response {
  if (body instanceof Response) return body;
  return Response.json(body ?? {}, { status });
}

async function readJson(request: Request): Promise<string> {
  const type = request.headers.get("content-type")?.split(";")[0].trim().toLowerCase();
  if (type !== "application/json") throw new AppError("wrong-media-type", "Send this as application/json.");
  if (Number(request.headers.get("content-length") ?? 0) > MAX_JSON_BYTES) throw new AppError("too-large", "The body is larger than 1 MiB.");
  const chunks: Uint8Array[] = [];
  let size = 0;
  for await (const chunk of (request.body ?? []) as AsyncIterable<Uint8Array>) {
    size += chunk.length;
    if (size > MAX_JSON_BYTES) throw new AppError("too-large", "The body is larger than 1 MiB.");
    chunks.push(chunk);
  }
  try {
    return new TextDecoder("utf-8", { fatal: true }).decode(Buffer.concat(chunks));
  } catch {
    throw new AppError("malformed", "The body is not UTF-8 text. Send JSON in UTF-8.");
  }
}

function jsonOf(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    throw new AppError("malformed", "The body is not JSON. Check quotes and commas.");
  }
}

/** Parses hostile input by a schema; what does not fit is named field by field (422). */
export function parse<I>(schema: z.ZodType<I>, value: unknown): I {
  const result = schema.safeParse(value);
  if (result.success) return result.data;
  const errors: FieldError[] = result.error.issues.map((issue) => ({ path: issue.path.join("."), message: issue.message }));
  const first = errors[0];
  throw new AppError("does-not-fit", first.path ? `${first.path}: ${first.message}` : first.message, { errors });
}
