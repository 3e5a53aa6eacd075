import { createBenchToken } from "@/lib/commands/create-bench-token";
import { introduceKey } from "@/lib/commands/introduce-key";
import { SYSTEM } from "@/lib/core/words";
import { tokenInput } from "@/lib/schemas/user";
import { User } from "@/models";
import { CommandRefusal, runCommand } from "./commands/run-command";

// `npm run token -- <e-mail> [name]`: a bench token with that person's rights, alone on the last line.
await runCommand(async ([address, ...words]) => {
  if (!address) throw new CommandRefusal("Give an e-mail address: npm run token -- <e-mail> [name of the bench]");
  const parsed = tokenInput.safeParse({ name: words.join(" ") || "Made on the command line" });
  if (!parsed.success) throw new CommandRefusal(parsed.error.issues.map((issue) => issue.message).join("\n"));
  const user = await User.findOne({ where: { email: address.trim().toLowerCase() } });
  if (!user) throw new CommandRefusal(`There is no account ${address}. The users page lists them all.`);
  await introduceKey();
  const { token } = await createBenchToken(SYSTEM, { name: parsed.data.name, userId: user.id });
  console.log(`Bench token of ${user.name} (${user.role}), "${parsed.data.name}". It is shown this once:`);
  console.log(token);
});
