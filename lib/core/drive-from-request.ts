/** What a request says about the drive and its board, as far as the customer knew it. */
export interface AskedDrive {
  partNumber?: string;
  model?: string;
  serial?: string;
  interface?: string;
  capacity?: string;
  made?: string;
  boardNumber?: string;
  revision?: string;
}

const NAMES: Record<keyof AskedDrive, readonly string[]> = {
  partNumber: ["partNumber"], model: ["model"], serial: ["serial"], interface: ["interface"], capacity: ["capacity"], made: ["made"],
  boardNumber: ["boardNumber"], revision: ["boardRevision", "revision"],
};

/** The label data in a request's answers; anything else in them, or answers of another shape, is passed over. */
export function driveFromRequest(answers: unknown): AskedDrive {
  const out: AskedDrive = {};
  for (const [field, names] of Object.entries(NAMES) as [keyof AskedDrive, readonly string[]][]) {
    const found = names.map((name) => answerOf(answers, name)).find((value) => value !== null);
    if (found) out[field] = found;
  }
  return out;
}

/** One text out of a request's answers, or null. */
export function answerOf(answers: unknown, name: string): string | null {
  if (typeof answers !== "object" || answers === null || !Object.hasOwn(answers, name)) return null;
  const value = (answers as Record<string, unknown>)[name];
  return typeof value === "string" && value.trim() !== "" ? value.trim() : null;
}

/** Address of "Record the drive" with what is known filled in. */
export function recordDriveAddress(caseId: string, asked: AskedDrive): string {
  const query = new URLSearchParams({ record: "drive" });
  for (const field of ["partNumber", "model", "serial", "interface"] as const) if (asked[field]) query.set(field, asked[field]);
  return `/cases/${caseId}?${query.toString()}`;
}
