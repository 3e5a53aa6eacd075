/** The browser's side of the API: one way to ask, one kind of refusal. */
export interface Problem {
  status: number;
  title: string;
  detail: string;
  errors?: { path: string; message: string }[];
}

export class Refusal extends Error {
  constructor(readonly problem: Problem) {
    super(problem.detail);
    this.name = "Refusal";
  }
  get status(): number {
    return this.problem.status;
  }
  get detail(): string {
    return this.problem.detail;
  }
}

const AWAY: Problem = { status: 0, title: "Twinread can't be reached", detail: "Twinread can't be reached. Check the network; nothing was changed. Then try again." };

const STOPPED: Problem = { status: 0, title: "Stopped", detail: "You stopped it before the answer came." };
const FILE_STOPPED: Problem = { ...STOPPED, detail: "You stopped it before its end, so no file was saved. What had begun stands in the log." };
// an answer that never came may belong to a change that was made
const UNKNOWN: Problem = { ...AWAY, detail: "Twinread can't be reached. Check the network; then look whether it was done before you try again." };

async function ask(path: string, init: RequestInit): Promise<Response> {
  const response = await fetch(path, { credentials: "same-origin", cache: "no-store", ...init }).catch(() => {
    throw new Refusal(init.signal?.aborted ? STOPPED : init.method ? UNKNOWN : AWAY);
  });
  if (response.ok) return response;
  throw new Refusal(await problemOf(response));
}

export async function problemOf(response: Response): Promise<Problem> {
  const body = (await response.json().catch(() => null)) as Partial<Problem> | null;
  return {
    status: response.status,
    title: body?.title ?? "Something went wrong",
    detail: body?.detail ?? "The server gave no reason. Try again; if it stays, tell whoever runs it.",
    errors: body?.errors,
  };
}

/** A change. `body` goes as JSON; the key makes a repeated click harmless. */
export async function send<T>(method: "POST" | "PUT" | "PATCH" | "DELETE", path: string, body?: unknown, key: string = crypto.randomUUID?.() ?? String(Math.random()), signal?: AbortSignal): Promise<T> {
  const response = await ask(path, {
    method, signal,
    headers: { ...(body === undefined ? {} : { "content-type": "application/json" }), "idempotency-key": key },
    body: body === undefined ? undefined : JSON.stringify(body),
  });
  return (await response.json()) as T;
}

/** For a POST that answers with a file: saves it under the name the server gives, and tells how many bytes have come, of how many where that is known. */
export async function save(path: string, body?: unknown, { signal, onBytes }: { signal?: AbortSignal; onBytes?(come: number, of: number | null): void } = {}): Promise<string> {
  const response = await ask(path, {
    method: "POST", signal, headers: body === undefined ? {} : { "content-type": "application/json" }, body: body === undefined ? undefined : JSON.stringify(body),
  });
  const name = /filename="([^"]+)"/.exec(response.headers.get("content-disposition") ?? "")?.[1] ?? "twinread.bin";
  const url = URL.createObjectURL(await wholeOf(response, onBytes).catch(() => {
    throw new Refusal(signal?.aborted ? FILE_STOPPED : { ...AWAY, detail: "The file broke off before its end and was not saved. The stored image may be damaged; ask the lead." });
  }));
  const link = document.createElement("a");
  link.href = url;
  link.download = name;
  link.click();
  setTimeout(() => URL.revokeObjectURL(url), 10_000);
  return name;
}

async function wholeOf(response: Response, onBytes?: (come: number, of: number | null) => void): Promise<Blob> {
  const of = Number(response.headers.get("content-length")) || null;
  const parts: Uint8Array<ArrayBuffer>[] = [];
  let come = 0;
  const reader = response.body!.getReader();
  for (let part = await reader.read(); !part.done; part = await reader.read()) {
    parts.push(part.value);
    onBytes?.((come += part.value.length), of);
  }
  return new Blob(parts, { type: response.headers.get("content-type") ?? "" });
}

export async function fetcher<T>(path: string, signal?: AbortSignal): Promise<T> {
  return (await ask(path, { signal })).json() as Promise<T>;
}

/** For refreshes that nobody asked for: they don't count as activity of the session. */
export async function backgroundFetcher<T>(path: string): Promise<T> {
  return (await ask(path, { headers: { "x-twinread-background": "1" } })).json() as Promise<T>;
}

/** A window of bytes, for the hex view. */
export async function bytesFetcher(path: string, signal?: AbortSignal): Promise<Uint8Array> {
  return new Uint8Array(await (await ask(path, { signal })).arrayBuffer());
}
