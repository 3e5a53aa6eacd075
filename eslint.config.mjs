import next from "@next/eslint-plugin-next";
import hooks from "eslint-plugin-react-hooks";
import tseslint from "typescript-eslint";

export default tseslint.config(
  { ignores: [".next/**", "dist/**", ".data/**", "next-env.d.ts", "test-results/**"] },
  ...tseslint.configs.recommended,
  {
    plugins: { "@next/next": next, "react-hooks": hooks },
    rules: {
      ...next.configs.recommended.rules,
      ...next.configs["core-web-vitals"].rules,
      ...hooks.configs.recommended.rules,
      "@typescript-eslint/no-unused-vars": ["error", { argsIgnorePattern: "^_", ignoreRestSiblings: true }],
    },
  },
  {
    // a browser test that forgets to look for troubles is none
    files: ["tests/e2e/**/*.spec.ts"],
    rules: { "no-restricted-imports": ["error", { paths: [{ name: "@playwright/test", importNames: ["test", "chromium"], message: "Import test from ./support/test: it fails for troubles in the browser." }] }] },
  },
);
