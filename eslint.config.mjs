import { defineConfig, globalIgnores } from "eslint/config";
import nextVitals from "eslint-config-next/core-web-vitals";
import nextTs from "eslint-config-next/typescript";
import tseslint from "typescript-eslint";

/** An import zone: files under `target` may import only what is listed. */
const only = (target, ...allowed) => ({
  target,
  from: ".",
  except: allowed.map((path) => `./${path}`),
  message: `${target} imports only ${allowed.join(", ")}.`,
});

export default defineConfig([
  globalIgnores([".next/**", ".local/**", ".test/**", "node_modules/**", "next-env.d.ts", "coverage/**"]),
  ...nextVitals,
  ...nextTs,
  {
    files: ["**/*.ts", "**/*.tsx"],
    ignores: ["**/*.mts"],
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    plugins: { "@typescript-eslint": tseslint.plugin },
    rules: {
      "@typescript-eslint/no-floating-promises": "error",
      "@typescript-eslint/no-misused-promises": ["error", { checksVoidReturn: { attributes: false } }],
      "@typescript-eslint/await-thenable": "error",
      "@typescript-eslint/switch-exhaustiveness-check": [
        "error",
        { considerDefaultExhaustiveForUnions: true },
      ],
      "@typescript-eslint/no-unused-vars": ["error", { argsIgnorePattern: "^_", varsIgnorePattern: "^_" }],
    },
  },
  {
    rules: {
      "no-eval": "error",
      "no-implied-eval": "error",
      "no-new-func": "error",
      "import/no-cycle": "error",
      "import/no-restricted-paths": [
        "error",
        {
          zones: [
            only("./lib/symbols", "lib/symbols", "node_modules/fraction.js"),
            only(
              "./lib/verify",
              "lib/verify",
              "lib/symbols",
              "node_modules/mathjs",
              "node_modules/fraction.js",
            ),
            only("./models", "models", "lib/env.ts", "node_modules"),
            {
              target: "./lib",
              from: ["./app", "./components", "./workers"],
              message: "lib/ does not know who calls it.",
            },
            {
              target: "./components",
              from: ["./app", "./models", "./workers"],
              message: "A component takes plain props.",
            },
            { target: "./app", from: "./workers", message: "Importing the worker would start it." },
          ],
        },
      ],
      "no-restricted-imports": [
        "error",
        {
          paths: [
            {
              name: "next-auth",
              importNames: ["getServerSession"],
              message: "Use getUser() or requireUser() from @/lib/auth/session: they check the session row.",
            },
          ],
        },
      ],
    },
  },
  { files: ["lib/{symbols,verify}/**"], rules: { "import/no-nodejs-modules": "error" } },
  { files: ["lib/auth/session.ts"], rules: { "no-restricted-imports": "off" } },
]);
