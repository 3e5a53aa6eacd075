import type { ReactNode } from "react";
import { Button } from "@/components/ui/button";
import { Digest } from "@/components/ui/digest";
import { FindingLine } from "@/components/ui/finding-line";
import { Progress } from "@/components/ui/progress";
import { sizeText, withCommas } from "@/lib/core/quantity";
import type { Stage } from "@/lib/core/words";
import { MAX_IMAGE_BYTES } from "@/lib/limits";
import type { ChipView } from "@/lib/views";
import { nameOf } from "./chip-words";
import { imageBytesOf, type Upload, type UploadQueue } from "./upload-queue";
import { sizeQuestion, willEqual } from "./will-equal";

/** "352 of 512 KiB": whole KiB while it runs. */
function farText(done: number, of: number): string {
  return of >= 1024 ? `${withCommas(Math.floor(done / 1024))} of ${withCommas(Math.ceil(of / 1024))} KiB` : `${withCommas(done)} of ${sizeText(of)}`;
}

const allSent = (upload: Upload) => upload.step === "sending" && upload.sent >= upload.file.size;

function stateWords(upload: Upload): { words: string; tone: string } {
  switch (upload.step) {
    case "waiting":
      return { words: "Waits for its turn", tone: "text-ink-2" };
    case "hashing":
      return { words: `Digest of ${farText(upload.hashed, upload.file.size)}`, tone: "" };
    case "asking":
      return { words: "Not sent yet", tone: "font-strong text-caution" };
    case "queued":
      return { words: "Waits to be sent", tone: "text-ink-2" };
    case "sending":
      return { words: allSent(upload) ? "Sent, being judged" : `${farText(upload.sent, upload.file.size)} sent`, tone: "" };
    case "stored":
      return { words: upload.read ? `Stored as ${nameOf(upload.read)}` : "Stored", tone: "font-strong text-green" };
    case "refused":
      return { words: "Not sent", tone: "font-strong text-block" };
    case "stopped":
      return { words: "Stopped, nothing stored", tone: "font-strong text-ink-2" };
  }
}

/** One file: its name, how far it is, both digests, what it will equal, and a way to stop it. */
export function UploadLine({ upload, queue, chip }: { upload: Upload; queue: UploadQueue; chip: ChipView }) {
  const { key, file, step, digest, target } = upload;
  const { words, tone } = stateWords(upload);
  const text = target.imageBytes !== null;
  // the digest of a text says nothing of the image in it
  const same = digest && !text && step !== "stored" ? willEqual(chip, target.fields.stage as Stage, digest.sha256) : null;
  const share = step === "hashing" ? upload.hashed / Math.max(1, file.size) : step === "sending" ? upload.sent / Math.max(1, file.size) : null;
  const fits = file.size > 0 && file.size <= MAX_IMAGE_BYTES;
  let ways: ReactNode = null;
  if (step === "asking") {
    ways = <>{fits ? <Button size="small" onClick={() => queue.send(key)}>Send anyway</Button> : null}<Off queue={queue} name={file.name} id={key} /></>;
  } else if (step === "refused" || step === "stopped") {
    ways = <>{digest && fits ? <Button size="small" onClick={() => queue.send(key)}>Send again</Button> : null}<Off queue={queue} name={file.name} id={key} /></>;
  } else if (step === "stored") {
    ways = <Off queue={queue} name={file.name} id={key} />;
  } else if (allSent(upload)) {
    ways = <span>Stored and judged as a whole, or not at all: this can’t be stopped.</span>;
  } else {
    ways = <Button variant="text" size="small" onClick={() => queue.stop(key)} aria-label={`Stop sending ${file.name}`}>Stop sending</Button>;
  }
  return (
    <li className="grid grid-cols-[minmax(0,1fr)_auto] items-start gap-x-5 gap-y-1 border-b border-rule py-2.5">
      <span className="font-mono !text-t2 font-semibold [overflow-wrap:anywhere]">{file.name}</span>
      <span className={`text-right ${tone}`} role="status">{words}</span>
      {share === null ? null : <span className="col-span-full"><Progress share={share} label={`${step === "hashing" ? "Computing the digest of" : "Sending"} ${file.name}`} /></span>}
      {step === "asking" ? <div className="col-span-full"><FindingLine kind="caution">{file.size > MAX_IMAGE_BYTES ? `Larger than ${sizeText(MAX_IMAGE_BYTES)}, the most a chip here can hold. Take it off the list.` : sizeQuestion(imageBytesOf(file, target), target.expectedBytes)}</FindingLine></div> : null}
      {upload.problem ? <div className="col-span-full" role="alert"><FindingLine kind="block">{upload.problem}</FindingLine></div> : null}
      <div className="col-span-full flex flex-wrap items-center gap-x-[18px] gap-y-0.5 text-t2 text-ink-2">
        <span>{target.words}</span>
        {digest ? <><span>{text ? "The text’s " : ""}CRC-32 <code>{digest.crc32.toUpperCase()}</code></span><span className="inline-flex items-center">SHA-256&nbsp;<Digest sha256={digest.sha256} copy={false} /></span></> : null}
        {text ? <span>becomes an image of {sizeText(imageBytesOf(file, target))}</span> : null}
        {same ? <b className={same.good ? "text-green" : "text-caution"}>{same.words}</b> : null}
        <span className="ml-auto flex flex-wrap items-center gap-x-4 gap-y-2">{ways}</span>
      </div>
    </li>
  );
}

function Off({ queue, name, id }: { queue: UploadQueue; name: string; id: string }) {
  return <Button variant="text" size="small" onClick={() => queue.remove(id)} aria-label={`Take ${name} off the list`}>Take off the list</Button>;
}
