import { notFound } from "next/navigation";
import { AppError } from "@/lib/errors";

/** For pages: what isn't there, or isn't yours to know of, is the not-found page. */
export async function orNotFound<T>(query: () => Promise<T>): Promise<T> {
  try {
    return await query();
  } catch (error) {
    if (error instanceof AppError && (error.code === "not-found" || error.code === "forbidden")) notFound();
    throw error;
  }
}
