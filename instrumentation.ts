/** Runs once when the server starts: refuse to run with wrong settings or too many rights, then start what works in the background. */
export async function register(): Promise<void> {
  if (process.env.NEXT_RUNTIME !== "nodejs") return;
  const { startUp } = await import("@/lib/start-up");
  await startUp();
}
