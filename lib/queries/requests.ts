import { deletionAnswerBy } from "@/lib/commands/ask-deletion";
import { caseFor } from "@/lib/commands/place";
import { allow } from "@/lib/commands/refuse";
import { withCheck } from "@/lib/core/case-number";
import { deriveChipState } from "@/lib/core/chip-state";
import { type RequestState, requestState } from "@/lib/core/request-state";
import type { Actor } from "@/lib/core/words";
import { env } from "@/lib/env";
import type { RequestAnswers } from "@/lib/schemas/request";
import type { RequestPageView, RequestSectionView, RequestSlipView } from "@/lib/views";
import { Board, type Case, Drive, Photo, Request, Share } from "@/models";
import { stateFacts } from "./chip-facts";
import { chipRecords } from "./chip-records";
import { linkEnds, openRequest } from "./open-request";
import { people } from "./people";
import { currentPolicy } from "./policy";

const DAY_MS = 86_400_000;

const answersOf = (request: Request): RequestAnswers => JSON.parse(request.answers) as RequestAnswers;

/** How the case stands in the customer's words. */
async function stateOf(found: Case): Promise<RequestState> {
  const drives = (await Drive.findAll({ where: { caseId: found.id }, attributes: ["id"] })).map((drive) => drive.id);
  const { records } = await chipRecords(drives);
  const policy = await currentPolicy();
  const noChip = (await Board.count({ where: { driveId: drives, role: "original", dataInController: true } })) > 0;
  return requestState({
    requestedAt: (found.requestedAt ?? found.receivedAt!).toISOString(), receivedAt: found.receivedAt?.toISOString() ?? null,
    hold: found.holdReason ? { waitingFor: found.waitingFor ?? null, since: found.waitingSince?.toISOString() ?? null, reason: found.holdReason } : null,
    noChip, chips: records.filter((record) => record.chip.needsTransfer).map((record) => deriveChipState(stateFacts(record, policy)).state),
    returnedAt: found.returnedAt?.toISOString() ?? null, closedAt: found.closedAt?.toISOString() ?? null, closedKind: found.closedKind ?? null,
  });
}

function deletionOf(request: Request): RequestPageView["deletion"] {
  if (!request.deletionAskedAt) return null;
  return {
    askedAt: request.deletionAskedAt.toISOString(), answerBy: deletionAnswerBy(request.deletionAskedAt).toISOString(),
    answered: request.deletionAnsweredAt ? { at: request.deletionAnsweredAt.toISOString(), answer: request.deletionAnswer ?? null } : null,
  };
}

/** The customer's private page: facts of this one case, no names of the workshop's people, no bytes of any image. */
export async function requestPage(token: string): Promise<RequestPageView | null> {
  const open = await openRequest(token);
  if (!open) return null;
  const { request, case: found, ends } = open;
  const share = await Share.findOne({ where: { caseId: found.id, withdrawnAt: null }, order: [["createdAt", "DESC"]] });
  const { workshop, workshopAddress, workshopHours, workshopContact } = env();
  const waits = !found.receivedAt && !found.closedAt;
  return {
    workshop, address: workshopAddress, hours: workshopHours, contact: workshopContact, refChecked: withCheck(found.ref), state: await stateOf(found), answers: answersOf(request),
    photos: await Photo.count({ where: { caseId: found.id, byUserId: null } }), requestedAt: request.requestedAt.toISOString(), receivedAt: found.receivedAt?.toISOString() ?? null, slip: waits, withdraws: waits,
    deletion: deletionOf(request), erasedAt: found.erasedAt?.toISOString() ?? null, summarySentAt: share?.createdAt.toISOString() ?? null, ends: ends?.toISOString() ?? null,
  };
}

/** What the slip for the parcel says; null when the link shows nothing. */
export async function requestSlip(token: string): Promise<RequestSlipView | null> {
  const open = await openRequest(token);
  if (!open) return null;
  const { workshop, workshopAddress, workshopHours } = env();
  return { workshop, address: workshopAddress, hours: workshopHours, refChecked: withCheck(open.case.ref), answers: answersOf(open.request) };
}

/** The request behind a case, for the desk; null for a case that was recorded here. */
export async function requestSection(actor: Actor, caseId: string): Promise<RequestSectionView | null> {
  allow(actor, "case.read");
  const found = await caseFor(actor, caseId);
  const request = await Request.findOne({ where: { caseId } });
  if (!request) return null;
  const ends = linkEnds(request, found, (await currentPolicy()).shareDays);
  const deletion = deletionOf(request);
  return {
    id: request.id, answers: answersOf(request), requestedAt: request.requestedAt.toISOString(), shown: (await stateOf(found)).title, closed: found.closedAt !== null && found.closedAt !== undefined,
    link: { ends: ends?.toISOString() ?? null, works: !ends || ends.getTime() > Date.now() },
    deletion: deletion && {
      ...deletion, daysLeft: Math.ceil((Date.parse(deletion.answerBy) - Date.now()) / DAY_MS), message: request.deletionMessage ?? null,
      answered: deletion.answered && { ...deletion.answered, by: (await people())(request.deletionAnsweredBy ?? null).name },
    },
  };
}
