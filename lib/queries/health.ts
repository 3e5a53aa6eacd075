import { QueryTypes } from "sequelize";
import { AppError } from "@/lib/errors";
import { connection } from "@/models";
import { freeBytes } from "@/storage";

/** Database and store answer, or 503. The pool may still hold a stale refusal from before a restart: two more tries. */
export async function health(): Promise<{ status: "ok" }> {
  await freeBytes().catch(() => {
    throw new AppError("unavailable", "The store can't be read.", { retryAfterSeconds: 5 });
  });
  for (let attempt = 1; ; attempt += 1) {
    try {
      await connection().query("SELECT 1", { type: QueryTypes.SELECT });
      return { status: "ok" };
    } catch {
      if (attempt === 3) throw new AppError("unavailable", "The database doesn't answer.", { retryAfterSeconds: 5 });
    }
  }
}
