import type { ApiRow, Things } from "../authorization-matrix";
import { emailOf } from "./accounts";
import { approve, makeReady, type Ready } from "./bench";
import { changeAccount, makeNewcomerToken, type Newcomer } from "./newcomers";
import { done, tokenOf } from "./station";

/** A case in all its parts, by what the folders of the addresses are called. */
export interface CaseParts extends Things {
  ids: Record<string, string>;
  ref: string;
  sha256: string;
  image: Uint8Array<ArrayBuffer>;
}

const NEVER = "0badc0de-0000-4000-8000-00000badc0de";

async function partsOf(ready: Ready, approvalId: string): Promise<CaseParts> {
  const token = await tokenOf("ines");
  const { ref } = await done<{ ref: string }>("GET", `/api/cases/${ready.caseId}`, { token });
  const shelf = await done<{ id: string }>("POST", "/api/shelf-boards", { token: await tokenOf("mira"), json: { boardNumber: "BX 40-3179", reservedFor: ref } });
  const ids = {
    cases: ready.caseId, drives: ready.driveId, boards: ready.boardId, chips: ready.chipId, reads: ready.reads[0].id, approvals: approvalId, checks: ready.driveId,
    // a link needs a verified case, a hand-over two people: what isn't there is asked for, which an auditor may not either way
    shares: NEVER, "hand-overs": NEVER, requests: NEVER, photos: NEVER,
    "shelf-boards": shelf.id,
  };
  return {
    ids, ref, sha256: ready.sha256, image: ready.image, caseId: ready.caseId, driveId: ready.driveId, chipId: ready.chipId, readId: ready.reads[0].id, unknown: NEVER,
    policy: {}, adminEmail: emailOf("odile"),
  };
}

export async function makeParts(customer: string): Promise<CaseParts> {
  const ready = await makeReady(await tokenOf("mira"), { customer, sizeBytes: 8192 });
  const answer = await approve(await tokenOf("ines"), ready, ready.sha256);
  return partsOf(ready, answer.json<{ id: string }>().id);
}

/** The same places of a case that never was. */
export const neverParts = (like: CaseParts): CaseParts => ({
  ...like, ids: Object.fromEntries(Object.keys(like.ids).map((noun) => [noun, NEVER])), ref: "", sha256: "0".repeat(64), caseId: NEVER, driveId: NEVER, chipId: NEVER, readId: NEVER,
});

/** The part of a case that a route is about, "chips" of "/api/chips/[id]/view"; null for a route about none. */
export function nounOf(route: string, parts: CaseParts): string | null {
  const noun = /\/([a-z-]+)\/\[id\]/.exec(route)?.[1];
  return noun !== undefined && noun in parts.ids ? noun : null;
}

/** Where a row of the matrix leads for this case, also where it would try what does not exist. */
export function addressIn(row: Pick<ApiRow, "route" | "at">, parts: CaseParts): string {
  const noun = nounOf(row.route, parts);
  return row.at?.(noun ? { ...parts, unknown: parts.ids[noun] } : parts) ?? row.route;
}

/** An auditor who may see these cases only, with session and bench token. */
export async function makeLimitedAuditor(cases: string[]): Promise<Newcomer & { cookie: string; token: string }> {
  const newcomer = await makeNewcomerToken("auditor");
  await changeAccount(newcomer.id, { cases, endsOn: "2099-12-31" });
  return newcomer;
}
