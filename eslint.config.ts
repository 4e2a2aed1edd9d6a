import hooks from "eslint-plugin-react-hooks";
import { defineConfig } from "eslint/config";
import tseslint from "typescript-eslint";

const severity = <Options>(level: "error", options: Options): ["error", Options] => [level, options];

/** Imports that a folder may not make, with the reason that lint prints. */
const forbid = (patterns: (({ group: string[] } | { regex: string }) & { message: string })[]) => ({
  "no-restricted-imports": severity("error", { patterns }),
});

const toServer = { group: ["**/server/**"], message: "Pages reach the server through its contracts only." };
const toClient = { group: ["**/src/**"], message: "The server knows nothing of the pages." };

export default defineConfig(
  { ignores: ["dist", ".data", "coverage", "node_modules", "**/*.mjs"] },
  tseslint.configs.strictTypeChecked,
  hooks.configs.flat["recommended-latest"],
  {
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    rules: {
      "max-lines": ["error", { max: 350, skipBlankLines: true, skipComments: true }],
      "@typescript-eslint/restrict-template-expressions": ["error", { allowNumber: true }],
      "@typescript-eslint/no-confusing-void-expression": [
        "error",
        { ignoreArrowShorthand: true, ignoreVoidReturningFunctions: true },
      ],
      // Indexing under noUncheckedIndexedAccess, in loops whose bounds prove it.
      "@typescript-eslint/no-non-null-assertion": "off",
      "@typescript-eslint/no-unnecessary-condition": ["error", { allowConstantLoopConditions: true }],
      "@typescript-eslint/only-throw-error": "error",
      // It warns of what the React compiler would skip; pages are built without it.
      "react-hooks/incompatible-library": "off",
      // Express and React take async handlers whose promises they or the query cache look after.
      "@typescript-eslint/no-misused-promises": ["error", { checksVoidReturn: false }],
    },
  },
  { files: ["shared/**"], rules: forbid([toServer, toClient]) },
  { files: ["server/**"], rules: forbid([toClient]) },
  {
    files: ["server/statistics/**"],
    rules: forbid([toClient, { regex: "^\\.\\./(?!\\.\\./shared/)", message: "The engine imports nothing of the server." }]),
  },
  { files: ["src/**"], rules: forbid([toServer]) },
  {
    files: ["src/features/**"],
    rules: forbid([
      toServer,
      { group: ["../*/*", "!../../*"], message: "Features don't import each other; share through components, charts or lib." },
    ]),
  },
  {
    files: ["src/components/**", "src/charts/**", "src/lib/**"],
    rules: forbid([toServer, { group: ["**/features/**"], message: "Shared parts know no feature." }]),
  },
);
