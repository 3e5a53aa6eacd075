import { AppError } from "@/lib/errors";
import { connection } from "@/models";

/** A sentence for whoever typed the command. */
export class CommandRefusal extends Error {}

/** Runs a command of the admin's, closes the database, and ends with 0, or with 1 and a sentence. */
export async function runCommand(work: (words: string[]) => Promise<void>): Promise<void> {
  try {
    await work(process.argv.slice(2));
  } catch (error) {
    console.error(error instanceof CommandRefusal || error instanceof AppError ? error.message : error);
    process.exitCode = 1;
  } finally {
    await connection().close();
  }
}
