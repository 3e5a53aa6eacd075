/** One right of the app's user: on a whole table, or on one of its columns. */
export interface Right {
  table: string;
  /** SELECT, INSERT, UPDATE, DELETE … */
  right: string;
  column: string | null;
}

export interface RightsChange {
  kind: "grant" | "revoke";
  table: string;
  /** as it stands in a GRANT statement: `UPDATE` or "UPDATE (`state`)" */
  what: string;
}

/** `UPDATE (a, b)` means one right a column. */
function spelledOut(table: string, grant: string): Right[] {
  const [, right, columns] = /^([A-Z ]+?)\s*(?:\(([^)]*)\))?$/.exec(grant.trim()) ?? [];
  if (!right) throw new Error(`"${grant}" on ${table} is not a right this program can read`);
  if (!columns) return [{ table, right, column: null }];
  return columns.split(",").map((column) => ({ table, right, column: column.trim() }));
}

/** What to grant and what to take away so that the user has exactly the wanted rights. Rights are taken first. */
export function rightsChanges(wanted: { table: string; grants: string[] }[], present: Right[]): RightsChange[] {
  const key = ({ table, right, column }: Right) => `${table}\0${right}\0${column ?? ""}`;
  const text = ({ right, column }: Right) => (column ? `${right} (\`${column}\`)` : right);
  const want = new Map(wanted.flatMap(({ table, grants }) => grants.flatMap((grant) => spelledOut(table, grant))).map((right) => [key(right), right]));
  const have = new Map(present.filter(({ right }) => right !== "USAGE").map((right) => [key(right), right]));
  return [
    ...[...have].filter(([name]) => !want.has(name)).map(([, right]) => ({ kind: "revoke" as const, table: right.table, what: text(right) })),
    ...[...want].filter(([name]) => !have.has(name)).map(([, right]) => ({ kind: "grant" as const, table: right.table, what: text(right) })),
  ];
}
