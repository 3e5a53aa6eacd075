import { logOperations } from "./operations";
import { imageCells } from "./image-cells";
import { recordOperations } from "./record-operations";
import { rewritingCells } from "./rewriting-cells";
import type { Scene, Sql } from "./scene";
import { turnedBackCells } from "./turned-back-cells";

export type Attacker = "A1" | "A2" | "A3" | "A4" | "A5" | "A6" | "A7";

export interface Cell {
  attacker: Attacker;
  name: string;
  row: string;
  run(db: Sql, scene: Scene): Promise<void>;
  /** what lies outside the database is put back by this */
  undo?(): void;
  /** the outside copies that the database is held against */
  outside?(scene: Scene): string[];
  /** the attacker reaches the data folder's witness file too, so it says nothing */
  noWitness?: boolean;
  /** nobody can see it, and why */
  unseen?: string;
}

const OWN_ACCOUNT = "The columns are not in the log: an e-mail address is never written there, a password has no digest there. The account's role and name are.";
const ROW_ALONE = "The check compares what decides anything. This row is for the eye: the log keeps what was recorded, and the log page and the bundle's report show it from there.";
const UNSEEN: Record<string, string> = {
  "case: another damage": ROW_ALONE,
  "account: another e-mail address": OWN_ACCOUNT, "account: another password": OWN_ACCOUNT,
};

function plainCells(): Cell[] {
  return (["A1", "A2", "A3"] as const).flatMap((attacker) => [...logOperations(), ...recordOperations()].map((operation): Cell => ({ attacker, ...operation, unseen: UNSEEN[operation.name] })));
}

export const allCells = (): Cell[] => [...plainCells(), ...rewritingCells(), ...turnedBackCells(), ...imageCells()];
