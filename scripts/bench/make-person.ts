import { writeFileSync } from "node:fs";
import { createBenchToken } from "@/lib/commands/create-bench-token";
import { createUser } from "@/lib/commands/create-user";
import { type Role, SYSTEM } from "@/lib/core/words";
import { connection } from "@/models";

// For a benchmark's own data folder: a person of a role (a technician when none is given) with a bench token, which goes
// into the file named.
const [, , file, role = "technician"] = process.argv;
const { user } = await createUser(SYSTEM, { email: "bench@alderlane.example", name: "Bench", role: role as Role }, undefined, false);
const { token } = await createBenchToken(SYSTEM, { name: "benchmark", userId: user.id });
writeFileSync(file, `${token}\n`, { mode: 0o600 });
await connection().close();
