import type { Cell } from "./cells";
import { putBack } from "./scene";

/** Root who puts last week's dump back. */
export function turnedBackCells(): Cell[] {
  const cell = (name: string, tables: string[] | undefined, more: Partial<Cell>): Cell => ({ attacker: "A5", name, row: "", run: (db) => putBack(db, "week", tables), ...more });
  const log = ["custody_heads", "custody_entries", "seals"];
  const unseen = "An earlier state is sound in itself. What was written after it is gone, and no copy given here is younger than it.";
  return [
    cell("put back the whole database; the data folder's witness file left alone", undefined, { outside: () => [] }),
    cell("put back database and data folder, no copy from outside", undefined, { outside: () => [], noWitness: true, unseen }),
    cell("put back database and data folder, the copy is older than the dump", undefined, { outside: ({ old }) => old, noWitness: true, unseen }),
    cell("put back database and data folder, a seal mailed since", undefined, { outside: ({ recent }) => [recent.mail], noWitness: true }),
    cell("put back database and data folder, a bundle made since", undefined, { outside: ({ recent }) => [recent.bundle], noWitness: true }),
    cell("put back database and data folder, a witness file on another disk", undefined, { outside: ({ recent }) => [recent.witness], noWitness: true }),
    cell("put back the log and its seals alone", log, {}), cell("put back the entries alone", ["custody_entries"], {}), cell("put back the heads alone", ["custody_heads"], {}), cell("put back the seals alone", ["seals"], {}),
    cell("put back entries and heads, not the seals", ["custody_heads", "custody_entries"], {}), cell("put back the approvals alone", ["approvals"], {}), cell("put back the reads alone", ["reads"], {}),
    cell("put back the accounts alone", ["users"], {}), cell("put back everything but the log", ["users", "cases", "drives", "boards", "chips", "images", "reads", "approvals", "transfers"], {}),
  ];
}
