import type { ComponentType } from "react";
import { ApprovalHelp } from "./approval";
import { CautionsHelp } from "./cautions-help";
import { CustodyHelp } from "./custody";
import { DifferHelp } from "./differ";
import { FindingsHelp } from "./findings";
import { IdentifyHelp } from "./identify";
import { LimitsHelp } from "./limits";
import { ReadsHelp } from "./reads";
import { RequestHelp } from "./request";
import { ReturnHelp } from "./return";
import type { TopicKey } from "./topics";
import { TransferHelp } from "./transfer";
import { WordsHelp } from "./words";

/** What stands on the page of each topic. The interface has a page of its own, which needs the address of this server. */
export const CONTENT: Record<Exclude<TopicKey, "api">, ComponentType> = {
  request: RequestHelp, identify: IdentifyHelp, reads: ReadsHelp, differ: DifferHelp, approval: ApprovalHelp, transfer: TransferHelp, custody: CustodyHelp, return: ReturnHelp,
  findings: FindingsHelp, limits: LimitsHelp, cautions: CautionsHelp, words: WordsHelp,
};
