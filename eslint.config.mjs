import nextVitals from "eslint-config-next/core-web-vitals";
import nextTs from "eslint-config-next/typescript";
import prettier from "eslint-config-prettier/flat";
import { defineConfig, globalIgnores } from "eslint/config";
import tseslint from "typescript-eslint";

const ENV = { selector: "MemberExpression[object.name='process'][property.name='env']", message: "Settings are read and checked in modules/access/env.ts." };
const INTL = { selector: "MemberExpression[object.name='Intl'], CallExpression[callee.property.name=/^toLocale/]", message: "Words, dates and numbers for a place are made in modules/kernel/format.ts." };
const STAR = { selector: "ExportAllDeclaration", message: "No barrels: import from the file that has the thing." };
const HTML = { selector: "JSXAttribute[name.name='dangerouslySetInnerHTML']", message: "Text is text: no raw HTML." };
const EVAL = { selector: "CallExpression[callee.name='eval'], NewExpression[callee.name='Function']", message: "No code from text." };
const everywhere = [ENV, INTL, STAR, HTML, EVAL];
const CLOCK = [
  { selector: "CallExpression[callee.object.name='Date'][callee.property.name='now'], NewExpression[callee.name='Date'][arguments.length=0]", message: "Domain takes now as an argument." },
  { selector: "CallExpression[callee.object.name='Math'][callee.property.name='random']", message: "Domain takes chance as an argument." },
  { selector: "CallExpression[callee.name='fetch']", message: "Domain does not go outside." },
];

export default defineConfig([
  globalIgnores([".next/**", "next-env.d.ts", "drizzle/**", ".data/**", ".test/**", "coverage/**", "public/**", "test-results/**", "playwright-report/**"]),
  ...nextVitals,
  ...nextTs,
  {
    files: ["**/*.{ts,tsx}"],
    extends: [tseslint.configs.recommendedTypeChecked],
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    rules: {
      "@typescript-eslint/no-misused-promises": ["error", { checksVoidReturn: { attributes: false } }],
      "@typescript-eslint/consistent-type-imports": ["error", { fixStyle: "inline-type-imports" }],
      "@typescript-eslint/no-non-null-assertion": "error",
      "@typescript-eslint/switch-exhaustiveness-check": ["error", { considerDefaultExhaustiveForUnions: true }],
      "@typescript-eslint/no-unused-vars": ["error", { argsIgnorePattern: "^_", varsIgnorePattern: "^_", destructuredArrayIgnorePattern: "^_", ignoreRestSiblings: true }],
      "@typescript-eslint/require-await": "off",
      // Branded whole numbers are numbers; their sign may be turned.
      "@typescript-eslint/no-unsafe-unary-minus": "off",
      // Takes out assertions that the inference of a form's values needs.
      "@typescript-eslint/no-unnecessary-type-assertion": "off",
      // Advice for the React compiler, which is not in use.
      "react-hooks/preserve-manual-memoization": "off",
      "no-restricted-syntax": ["error", ...everywhere],
      "max-lines": ["error", { max: 500, skipBlankLines: true, skipComments: true }],
    },
  },
  { files: ["modules/*/domain/**/*.ts", "modules/flow/workings/**/*.ts", "modules/kernel/**/*.ts"], ignores: ["**/*.test.ts"], rules: { "no-restricted-syntax": ["error", ...everywhere, ...CLOCK] } },
  { files: ["modules/kernel/format.ts", "modules/kernel/instant.ts"], rules: { "no-restricted-syntax": ["error", ENV, STAR, HTML, EVAL, ...CLOCK] } },
  { files: ["modules/access/env.ts", "db/client.ts", "db/migrate.ts", "proxy.ts", "*.config.{ts,mjs}", "scripts/**", "seed/**", "tests/**", "**/*.test.ts"], rules: { "no-restricted-syntax": ["error", STAR, EVAL] } },
  { files: ["db/schema/index.ts"], rules: { "no-restricted-syntax": ["error", ...everywhere.filter((r) => r !== STAR)] } },
  { files: ["tailwind.config.ts"], rules: { "@typescript-eslint/unbound-method": "off" } },
  { files: ["**/*.{mjs,cjs}"], rules: { "@typescript-eslint/no-require-imports": "off" } },
  prettier,
]);
