import type { Readable } from "node:stream";
import { bagName } from "@/lib/core/bundle-layout";
import type { Actor } from "@/lib/core/words";
import { bundleFiles } from "./bundle-files";
import { type BundlePlan, completeBundle, startBundle } from "./bundle-plan";
import { zipStream } from "./bundle-zip";
import { allow } from "./refuse";
import { requireSoundImage } from "./report-image";

export interface Bundle {
  /** a name of ours, "twinread-26-0042.zip" */
  fileName: string;
  stream: Readable;
}

/**
 * The whole case as one archive that anybody can check. Recorded first in each drive's log; every stored image is read
 * and checked before the first byte leaves; recorded again after the last one.
 */
export async function makeBundle(actor: Actor, caseId: string): Promise<Bundle> {
  allow(actor, "bundle.make");
  const plan = await startBundle(actor, caseId);
  const distinct = new Map([...plan.images, ...plan.photos].map((image) => [image.sha256, image.sizeBytes]));
  for (const [sha256, sizeBytes] of distinct) await requireSoundImage(sha256, sizeBytes, "bundle");
  return writeBundle(actor, plan);
}

/** Called twice with one plan it gives the same bytes twice. */
export async function writeBundle(actor: Actor, plan: BundlePlan): Promise<Bundle> {
  const { files, tagManifestSha256 } = await bundleFiles(plan);
  const stream = zipStream(files, {
    folder: bagName(plan.ref), date: new Date(plan.madeAt), completed: () => completeBundle(actor, plan, tagManifestSha256),
  });
  return { fileName: `${bagName(plan.ref)}.zip`, stream };
}
