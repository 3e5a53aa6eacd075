import type { BoardRole } from "@/lib/core/words";
import type { ChipSummary } from "./chip";

export interface BoardView {
  id: string;
  role: BoardRole;
  boardNumber: string;
  revision: string | null;
  controllerMarking: string | null;
  motorDriverMarking: string | null;
  condition: string | null;
  /** the unique data lies inside the main controller: there is no chip to move */
  dataInController: boolean;
  fit: { verdict: "fits" | "caution" | "other-number"; differences: string[]; reason: string | null } | null;
  chips: ChipSummary[];
}
