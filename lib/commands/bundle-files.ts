import { createHash } from "node:crypto";
import { Readable } from "node:stream";
import { text } from "node:stream/consumers";
import {
  bagInfoTxt, bagitTxt, CASE_JSON, compositePaths, custodyPath, LOG_KEY, MANIFEST, manifestLine, PROVENANCE_ENDING, readmeTxt, REPORT_PDF, SEAL_KEY,
  SEAL_PROOF, SEAL_SIGNATURE, SEAL_TEXT, TAG_MANIFEST, TAG_SIGNATURE, VOTES_ENDING, WORKSHOP_KEYS,
} from "@/lib/core/bundle-layout";
import { canonicalJson } from "@/lib/core/canonical";
import { CHECK_SCRIPT } from "@/lib/core/check-script";
import { provenance } from "@/lib/core/composite-prov";
import { AppError } from "@/lib/errors";
import { imageChunks, logKey, verifiedStream } from "@/storage";
import { bodyLines, keysPart, type LogPart, signatureLines } from "./bundle-log";
import type { BundlePlan } from "./bundle-plan";
import { bundleReport } from "./bundle-report";
import { reportImage } from "./report-image";

/** One file of the bundle. Its digest and size are known before its first byte flows. */
export interface BundleFile {
  path: string;
  sha256: string;
  sizeBytes: number;
  open(): Readable;
  executable?: true;
}

const sha256Of = (bytes: Uint8Array) => createHash("sha256").update(bytes).digest("hex");

function textFile(path: string, content: string | Buffer): BundleFile {
  const bytes = Buffer.from(content);
  return { path, sha256: sha256Of(bytes), sizeBytes: bytes.length, open: () => Readable.from([bytes], { objectMode: false }) };
}

/** Read twice from the append-only log: once for its digest, once to send. What differs the second time breaks the stream. */
async function logFile(path: string, lines: () => AsyncIterable<Buffer>): Promise<BundleFile> {
  const whole = createHash("sha256");
  let sizeBytes = 0;
  for await (const line of lines()) {
    whole.update(line);
    sizeBytes += line.length;
  }
  const sha256 = whole.digest("hex");
  async function* again(): AsyncGenerator<Buffer> {
    const hash = createHash("sha256");
    for await (const line of lines()) {
      hash.update(line);
      yield line;
    }
    if (hash.digest("hex") !== sha256) throw new Error(`${path} changed while the bundle was sent`);
  }
  return { path, sha256, sizeBytes, open: () => Readable.from(again(), { objectMode: false }) };
}

const logFiles = (path: string, part: LogPart) => Promise.all([logFile(`${path}.jsonl`, () => bodyLines(part)), logFile(`${path}.sig`, () => signatureLines(part))]);

function imageFile(path: string, sha256: string, sizeBytes: number): BundleFile {
  const open = () => {
    const stream = verifiedStream(sha256);
    stream.once("error", () => {
      void reportImage(sha256, "damaged", "bundle").catch((error: unknown) => console.error("could not record a damaged image:", error));
    });
    return stream;
  };
  return { path, sha256, sizeBytes, open };
}

/** Everything under data/, in the order in which it is sent. Another kind of payload is one more line here. */
async function payload(plan: BundlePlan, logKeyPem: string): Promise<BundleFile[]> {
  const files = [textFile(CASE_JSON, plan.caseJson), textFile(REPORT_PDF, await bundleReport(plan))];
  for (const drive of plan.drives) files.push(...(await logFiles(custodyPath(drive.number), { chain: drive.id, upToSeq: drive.head.seq })));
  files.push(...(await logFiles(WORKSHOP_KEYS, keysPart(plan.workshopSeq))), textFile(LOG_KEY, logKeyPem));
  const { seal } = plan;
  files.push(textFile(SEAL_TEXT, seal.text), textFile(SEAL_SIGNATURE, Buffer.from(seal.signature, "base64")), textFile(SEAL_KEY, seal.key), textFile(SEAL_PROOF, seal.proof));
  for (const { path, sha256 } of plan.images.filter((image) => image.path.endsWith(VOTES_ENDING))) {
    const report = await text(imageChunks(sha256));
    files.push(textFile(path.replace(VOTES_ENDING, PROVENANCE_ENDING), canonicalJson(provenance(report, { reportSha256: sha256 }))));
  }
  files.push(...[...plan.images, ...plan.photos].map((image) => imageFile(image.path, image.sha256, image.sizeBytes)));
  return files;
}

const manifest = (files: BundleFile[]) => [...files].sort((a, b) => (a.path < b.path ? -1 : 1)).map((file) => manifestLine(file.sha256, file.path)).join("");

/** The whole bag, lists first. The same plan gives the same bytes: Ed25519 signatures are deterministic (RFC 8032). */
export async function bundleFiles(plan: BundlePlan): Promise<{ files: BundleFile[]; tagManifestSha256: string }> {
  const key = logKey();
  if (key.keyId !== plan.logKeyId) throw new AppError("rule-against", "The key that signs the log was changed while this bundle was put together. Ask for it again.");
  const data = await payload(plan, key.publicKeyPem);
  const octets = data.reduce((sum, file) => sum + file.sizeBytes, 0);
  const tags = [
    textFile("bagit.txt", bagitTxt()),
    textFile("bag-info.txt", bagInfoTxt({ date: plan.madeAt.slice(0, 10), ref: plan.ref, octets, files: data.length })),
    textFile(MANIFEST, manifest(data)),
    textFile("README.txt", readmeTxt({ ...plan, seal: plan.seal.number, drives: plan.drives.length, images: plan.images.length, composites: compositePaths(plan.images.map((image) => image.path)) })),
    { ...textFile("check.sh", CHECK_SCRIPT), executable: true as const },
  ];
  const tagText = manifest(tags);
  const tagManifest = textFile(TAG_MANIFEST, tagText);
  const signature = textFile(TAG_SIGNATURE, key.sign(Buffer.from(tagText)));
  return { files: [...tags, tagManifest, signature, ...data], tagManifestSha256: tagManifest.sha256 };
}
