import { refuseErased } from "@/lib/commands/erased-image";
import { readFor } from "@/lib/commands/place";
import { allow, notFound } from "@/lib/commands/refuse";
import { reportImage } from "@/lib/commands/report-image";
import { derivedFacts } from "@/lib/core/derived";
import type { Actor } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import type { VotesView } from "@/lib/views";
import { Image } from "@/models";
import { checkImage, imageChunks } from "@/storage";

/** The votes behind a composite, from its stored report; the report is checked against the digest in the log first. */
export async function votes(actor: Actor, readId: string): Promise<VotesView> {
  allow(actor, "case.read");
  const { read } = await readFor(actor, readId, "composite");
  const derived = derivedFacts(read);
  if (!derived) throw notFound("composite");
  await refuseErased(derived.reportSha256);
  const stored = await Image.findByPk(Buffer.from(derived.reportSha256, "hex"));
  const first = stored ? await checkImage(derived.reportSha256, stored.sizeBytes) : "missing";
  if (first !== "sound" && (await reportImage(derived.reportSha256, first, "a look at the votes")) !== "sound") {
    throw new AppError("rule-against", "The stored report of this composite no longer matches its digest. Tell the lead; make the composite again from its reads.");
  }
  const chunks: Buffer[] = [];
  for await (const chunk of imageChunks(derived.reportSha256)) chunks.push(chunk);
  return JSON.parse(Buffer.concat(chunks).toString("utf8")) as VotesView;
}
