import { randomBytes } from "node:crypto";
import { addressOf } from "@/lib/auth/address";
import { inAddressTurn, noteTry, requireRequestRoom } from "@/lib/commands/request-room";
import { addressDigest, checkStamp, keptKey, tokenFor } from "@/lib/commands/request-secrets";
import { type MadeRequest, requestTransfer } from "@/lib/commands/request-transfer";
import { NIL } from "@/lib/core/words";
import { env } from "@/lib/env";
import { AppError } from "@/lib/errors";
import { once, requestHash } from "./idempotency";
import { checkOrigin } from "./origin";
import { answerTo } from "./problem";
import { requestFieldsOf } from "./request-fields";
import { readOut, REQUEST_PHOTOS, takeUpload, type Upload } from "./upload";

const ROUTE = "POST /api/requests";

/**
 * A customer's request: multipart, anyone, from our own page. Whether there is room is asked before the body is taken in.
 * The answer holds the private link; what is kept of it under the Idempotency-Key is only the case, and the link is made
 * again from the key and the request (request-secrets.ts).
 */
export function requestHandler() {
  return async (request: Request): Promise<Response> => {
    try {
      checkOrigin(request);
      const address = addressDigest(addressOf(request.headers.get("x-forwarded-for")));
      noteTry(address);
      await requireRequestRoom(address);
      const key = request.headers.get("idempotency-key");
      if (key !== null && (key.length < 16 || key.length > 200)) throw new AppError("malformed", "An Idempotency-Key of a request has 16 to 200 characters that nobody can guess.");
      return await inAddressTurn(address, () => takeUpload(request, async (upload) => {
        const { answers, stamp } = requestFieldsOf(upload);
        const hash = hashOf(upload);
        const token = key === null ? randomBytes(32).toString("base64url") : tokenFor(key, hash);
        const files = upload.files.map(({ arrived, fileName }) => ({ arrived, fileName }));
        const { status, body } = await once(NIL, ROUTE, key === null ? null : keptKey(key), hash, 201, () => {
          checkStamp(stamp);
          return requestTransfer(answers, files, { token, address });
        });
        const { ref, refChecked } = body as MadeRequest;
        return Response.json({ ref, refChecked, link: `${env().publicUrl}/request/${token}` }, { status });
      }, REQUEST_PHOTOS));
    } catch (error) {
      const response = answerTo(error);
      // closing on a sender who is still sending would lose the answer on its way
      await readOut(request);
      response.headers.set("connection", "close");
      return response;
    }
  };
}

/** The stamp is no part of what makes two requests the same: a page that was loaded again sends another. */
function hashOf(upload: Upload): Buffer {
  const fields = [...upload.fields].filter(([name]) => name !== "stamp").sort();
  return requestHash([ROUTE, JSON.stringify(fields), ...upload.files.flatMap((file) => [file.fileName, file.arrived.sha256])]);
}
