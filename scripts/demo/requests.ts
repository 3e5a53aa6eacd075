import { randomBytes } from "node:crypto";
import { Readable } from "node:stream";
import { addPhotos, type PhotoFile } from "@/lib/commands/add-photos";
import { addressDigest } from "@/lib/commands/request-secrets";
import { requestTransfer } from "@/lib/commands/request-transfer";
import { type Actor, DEFAULT_POLICY, type PhotoSubject } from "@/lib/core/words";
import { requestAnswers, type RequestForm } from "@/lib/schemas/request";
import { receive } from "@/storage";

/** What customers send by the public form, and photos as they come from a camera. */

type Answers = Pick<RequestForm, "name" | "email" | "returnAddress" | "partNumber" | "enclosure" | "lock" | "damage" | "importance"> & Partial<RequestForm>;

export interface Shot {
  fileName: string;
  caption?: string;
  picture: Buffer;
}

/** A request with every line ticked, signed by whoever asks. The private link leaves in the customer's mail. */
export async function ask(answers: Answers, shots: readonly Shot[] = []): Promise<{ id: string; ref: string }> {
  const ticked = { consentOwner: "yes", consentRead: "yes", consentWrite: "yes", consentSolder: "yes" } as const;
  const parsed = requestAnswers.parse({ ...ticked, keepDays: DEFAULT_POLICY.erasureDays, signature: answers.name, ...answers });
  const { caseId, ref } = await requestTransfer(parsed, await filesOf(shots), { token: randomBytes(32).toString("base64url"), address: addressDigest("192.0.2.14") });
  return { id: caseId, ref };
}

export async function photograph(actor: Actor, of: PhotoSubject, id: string, ...shots: Shot[]): Promise<void> {
  await addPhotos(actor, of, id, await filesOf(shots));
}

const filesOf = (shots: readonly Shot[]): Promise<PhotoFile[]> =>
  Promise.all(shots.map(async ({ picture, ...named }) => ({ ...named, arrived: await receive(Readable.from([picture])) })));
