/** What a request says about the drive and its board, as far as the customer knew it. */
export interface AskedDrive {
  partNumber?: string;
  model?: string;
  serial?: string;
  interface?: string;
  boardNumber?: string;
  revision?: string;
}

const NAMES: Record<keyof AskedDrive, readonly string[]> = {
  partNumber: ["partNumber"], model: ["model"], serial: ["serial", "serialNumber"], interface: ["interface"],
  boardNumber: ["boardNumber"], revision: ["revision", "boardRevision"],
};

/** The label data in a request's answers; anything else in them, or answers of another shape, is passed over. */
export function driveFromRequest(answers: unknown): AskedDrive {
  const places = [answers, inside(answers, "drive"), inside(answers, "board")];
  const out: AskedDrive = {};
  for (const [field, names] of Object.entries(NAMES) as [keyof AskedDrive, readonly string[]][]) {
    const found = places.flatMap((place) => names.map((name) => inside(place, name))).find((value) => typeof value === "string" && value.trim() !== "");
    if (typeof found === "string") out[field] = found.trim();
  }
  return out;
}

function inside(value: unknown, name: string): unknown {
  return typeof value === "object" && value !== null && Object.hasOwn(value, name) ? (value as Record<string, unknown>)[name] : undefined;
}

/** Address of "Record the drive" with what is known filled in. */
export function recordDriveAddress(caseId: string, asked: AskedDrive): string {
  const query = new URLSearchParams({ record: "drive" });
  for (const field of ["partNumber", "model", "serial", "interface"] as const) if (asked[field]) query.set(field, asked[field]);
  return `/cases/${caseId}?${query.toString()}#record`;
}
