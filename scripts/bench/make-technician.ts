import { writeFileSync } from "node:fs";
import { createBenchToken } from "@/lib/commands/create-bench-token";
import { createUser } from "@/lib/commands/create-user";
import { SYSTEM } from "@/lib/core/words";
import { connection } from "@/models";

// For the benchmark's own data folder: a technician with a bench token, which goes into the file named.
const [, , file] = process.argv;
const { user } = await createUser(SYSTEM, { email: "bench@alderlane.example", name: "Bench", role: "technician" }, undefined, false);
const { token } = await createBenchToken(SYSTEM, { name: "benchmark", userId: user.id });
writeFileSync(file, `${token}\n`, { mode: 0o600 });
await connection().close();
