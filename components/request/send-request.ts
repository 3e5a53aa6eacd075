import { problemOf, Refusal } from "@/lib/http/send";
import type { Draft } from "./draft";

export interface SentRequest {
  ref: string;
  refChecked: string;
  link: string;
}

const AWAY = { status: 0, title: "Not sent", detail: "The workshop’s page can’t be reached right now. Nothing is lost: what you typed stays here. Check the network and send again." };

const STOPPED = { status: 0, title: "Stopped", detail: "You stopped the sending. What you typed stays here; sent again, it is one request all the same." };

let last: { content: string; key: string } | null = null;

function randomKey(): string {
  return [...crypto.getRandomValues(new Uint8Array(24))].map((byte) => byte.toString(16).padStart(2, "0")).join("");
}

/** The same content sent twice is one request: a lost answer never makes a second case. */
function keyFor(content: string): string {
  if (last?.content !== content) last = { content, key: randomKey() };
  return last.key;
}

/** Sends the answers with the photos. A refusal is thrown; everything typed stays where it is. */
export async function sendRequest(draft: Draft, files: readonly File[], guard: { website: string; stamp: string }, signal?: AbortSignal): Promise<SentRequest> {
  const form = new FormData();
  for (const [name, value] of Object.entries(draft)) {
    if (value === true) form.set(name, "yes");
    else if (typeof value === "string" && value !== "") form.set(name, value);
  }
  form.set("website", guard.website);
  form.set("stamp", guard.stamp);
  const content = JSON.stringify([draft, files.map((file) => [file.name, file.size, file.lastModified])]);
  for (const file of files) form.append("file", file, file.name);
  const response = await fetch("/api/requests", { method: "POST", body: form, signal, credentials: "same-origin", cache: "no-store", headers: { "idempotency-key": keyFor(content) } }).catch(() => {
    throw new Refusal(signal?.aborted ? STOPPED : AWAY);
  });
  if (!response.ok) throw new Refusal(await problemOf(response));
  return (await response.json()) as SentRequest;
}
