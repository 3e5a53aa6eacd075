import { erasedText } from "@/lib/commands/erased-image";
import type { ErasedView } from "@/lib/views";
import { Image, type Transaction } from "@/models";

type Row = Pick<Image, "sha256" | "state" | "erasedAt" | "erasedCause">;

/** Those among these images that were erased, by their digest in hex. */
export function erasedViews(rows: readonly Row[]): Map<string, ErasedView> {
  return new Map(rows.flatMap((row) => (row.state === "erased" && row.erasedAt ? [[row.sha256.toString("hex"), { at: row.erasedAt.toISOString(), cause: row.erasedCause ?? "due", text: erasedText(row) ?? "" }] as const] : [])));
}

/** The same for digests whose rows are not at hand. */
export async function erasedOf(digests: readonly Buffer[], tx?: Transaction): Promise<Map<string, ErasedView>> {
  if (digests.length === 0) return new Map();
  return erasedViews(await Image.findAll({ attributes: ["sha256", "state", "erasedAt", "erasedCause"], where: { sha256: [...digests], state: "erased" }, transaction: tx }));
}
