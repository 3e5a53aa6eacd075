import path from "node:path";
import { defineConfig } from "vitest/config";
import { BaseSequencer } from "vitest/node";

const root = import.meta.dirname;

/** Files that share a database by their names, on every machine alike: by itself the runner goes by sizes and by what earlier runs took. */
class SharedByName extends BaseSequencer {
  override async sort(files: Parameters<BaseSequencer["sort"]>[0]): ReturnType<BaseSequencer["sort"]> {
    const shared = files.filter((file) => file.project.name === "database").sort((a, b) => (a.moduleId < b.moduleId ? -1 : 1));
    return [...(await super.sort(files.filter((file) => !shared.includes(file)))), ...shared];
  }
}

export default defineConfig({
  resolve: {
    alias: [
      { find: "server-only", replacement: path.join(root, "tests/support/empty.ts") },
      { find: /^@\//, replacement: `${root}/` },
    ],
  },
  test: {
    environment: "node",
    globalSetup: ["tests/support/build-worker.ts"],
    pool: "forks",
    sequence: { sequencer: SharedByName },
    testTimeout: 60_000,
    hookTimeout: 60_000,
    projects: [
      { extends: true, test: { name: "rules", include: ["tests/{core,components,scripts}/**/*.test.ts"], sequence: { groupOrder: 0 } } },
      // these share one database: one file after the other
      { extends: true, test: { name: "database", include: ["tests/database/**/*.test.ts"], fileParallelism: false, sequence: { groupOrder: 1 } } },
    ],
  },
});
