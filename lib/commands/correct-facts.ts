import type { Model } from "sequelize";

export interface Change {
  field: string;
  from: string | number | boolean | null;
  to: string | number | boolean | null;
}

/** What really changes, field by field; a value that stays is no change. */
export function changesOf(row: Model, wanted: Record<string, unknown>): Change[] {
  const found: Change[] = [];
  for (const [field, to] of Object.entries(wanted)) {
    if (to === undefined) continue;
    const from = (row.get(field) ?? null) as Change["from"];
    if (from !== to) found.push({ field, from, to: to as Change["to"] });
  }
  return found;
}
