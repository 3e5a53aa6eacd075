import type { DriveWarning } from "@/lib/core/drive-warnings";
import type { StartUpFacts } from "@/lib/core/start-up";
import type { Encryption } from "@/lib/core/words";
import type { BoardView } from "./board";
import type { PersonView } from "./person";

export interface DriveView {
  id: string;
  caseId: string;
  letter: string;
  partNumber: string | null;
  model: string | null;
  serial: string | null;
  interface: string | null;
  capacity: string | null;
  made: string | null;
  firmware: string | null;
  /** null where nobody has said */
  encryption: Encryption | null;
  /** what speaks against the label data, as far as the asker may see the other cases */
  warnings: DriveWarning[];
  boards: BoardView[];
  custodyEntries: number;
}

export interface StartUpView extends StartUpFacts {
  id: string;
  note: string | null;
  by: PersonView;
  at: string;
}

export interface DriveStartUps {
  driveId: string;
  /** newest first */
  tests: StartUpView[];
  /** why it may not be started yet */
  refusal: string | null;
  /** serial on the label */
  label: string | null;
  /** the case is closed */
  closed: boolean;
}
