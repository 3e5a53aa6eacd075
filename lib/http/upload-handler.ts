import type { Actor } from "@/lib/core/words";
import { actorOf } from "@/lib/auth/actor";
import { AppError } from "@/lib/errors";
import { once, requestHash } from "./idempotency";
import { checkOrigin } from "./origin";
import { answerTo } from "./problem";
import { READS, readOut, takeUpload, type Upload, type UploadLimits } from "./upload";

export interface UploadCall {
  actor: Actor;
  id: string;
  upload: Upload;
}

const UUID = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/i;

/**
 * The twin of handler() for multipart calls. `before` is asked ahead of the body, so that who may not store anything
 * does not get to fill the disk; `run` changes something and is done once per Idempotency-Key.
 */
export function uploadHandler(options: { before: (actor: Actor, id: string) => Promise<void>; status: number; changes: boolean; limits?: UploadLimits }, run: (call: UploadCall) => Promise<unknown>) {
  return async (request: Request, context: { params: Promise<Record<string, string>> }): Promise<Response> => {
    try {
      const { id = "" } = (await context.params) ?? {};
      const actor = await actorOf(request);
      checkOrigin(request);
      if (id && !UUID.test(id)) throw new AppError("not-found", "There is nothing under this address. Check the link.");
      await options.before(actor, id);
      const answer = await takeUpload(request, async (upload) => {
        const hash = requestHash(["POST", new URL(request.url).pathname, JSON.stringify([...upload.fields].sort()), ...upload.files.flatMap((f) => [f.fileName, f.arrived.sha256])]);
        const key = options.changes ? request.headers.get("idempotency-key") : null;
        return once(actor.id, `POST ${new URL(request.url).pathname}`, key, hash, options.status, () => run({ actor, id, upload }));
      }, options.limits ?? READS);
      return Response.json(answer.body, { status: answer.status });
    } catch (error) {
      const response = answerTo(error);
      // closing on a sender who is still sending would lose the answer on its way
      await readOut(request);
      response.headers.set("connection", "close");
      return response;
    }
  };
}
