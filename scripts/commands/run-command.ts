import { AppError } from "@/lib/errors";
import { connection } from "@/models";

/** A sentence for whoever typed the command. */
export class CommandRefusal extends Error {}

/** Why the work stopped, in a sentence; null for what nobody foresaw. */
export function reasonOf(error: unknown): string | null {
  if (error instanceof CommandRefusal || error instanceof AppError) return error.message;
  if (!(error instanceof Error) || !error.name.startsWith("Sequelize")) return null;
  return `The database did not answer as it should (${error.message}). If Twinread was never started on this data folder, run npm start once.`;
}

/** Runs a command of the admin's, closes the database, and ends with 0, or with 1 and a sentence. */
export async function runCommand(work: (words: string[]) => Promise<void>): Promise<void> {
  try {
    await work(process.argv.slice(2));
  } catch (error) {
    console.error(reasonOf(error) ?? error);
    process.exitCode = 1;
  } finally {
    await connection().close();
  }
}
