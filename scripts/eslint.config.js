import js from "@eslint/js";
import reactHooks from "eslint-plugin-react-hooks";
import tseslint from "typescript-eslint";

const typed = ["app/**/*.{ts,tsx}", "tests/**/*.{ts,tsx}"];

export default tseslint.config(
  { ignores: ["build/**", ".react-router/**", "node_modules/**"] },
  js.configs.recommended,
  ...tseslint.configs.recommendedTypeChecked.map((config) => ({ ...config, files: typed })),
  {
    files: typed,
    plugins: { "react-hooks": reactHooks },
    languageOptions: { parserOptions: { projectService: true } },
    rules: {
      ...reactHooks.configs.recommended.rules,
      "max-lines": ["error", 400],
      "@typescript-eslint/consistent-type-definitions": ["error", "type"],
      "@typescript-eslint/no-explicit-any": "error",
      // Routes and middleware throw Responses and data() on purpose: the framework's own way to answer early.
      "@typescript-eslint/only-throw-error": "off",
      "@typescript-eslint/require-await": "off",
      "@typescript-eslint/no-unused-vars": ["error", { argsIgnorePattern: "^_", varsIgnorePattern: "^_" }],
      "@typescript-eslint/restrict-template-expressions": ["error", { allowNumber: true }],
      "@typescript-eslint/consistent-type-assertions": ["error", { assertionStyle: "never" }],
      "no-restricted-properties": [
        "error",
        { object: "process", property: "env", message: "Read settings from lib/env.server.ts." },
      ],
      "no-restricted-globals": ["error", { name: "parseFloat", message: "Use readNumber of domain/readings.ts." }],
    },
  },
  { files: ["app/lib/env.server.ts", "tests/**"], rules: { "no-restricted-properties": "off" } },
  {
    files: ["tests/**", "app/domain/units.ts", "app/components/charts/**"],
    rules: { "@typescript-eslint/consistent-type-assertions": "off" },
  },
  {
    files: ["app/domain/**"],
    rules: {
      "no-restricted-syntax": [
        "error",
        { selector: "NewExpression[callee.name='Date'][arguments.length=0]", message: "The date is an argument." },
        { selector: "MemberExpression[object.name='Date'][property.name='now']", message: "The date is an argument." },
      ],
    },
  },
  {
    files: ["scripts/**/*.{js,cjs}", "idp/**/*.js", "data/**/*.js"],
    languageOptions: {
      globals: Object.fromEntries(
        [
          "process",
          "console",
          "Buffer",
          "URL",
          "URLSearchParams",
          "setTimeout",
          "clearTimeout",
          "setInterval",
          "clearInterval",
          "fetch",
          "AbortSignal",
          "module",
          "require",
          "__dirname",
          "performance",
          "Response",
          "TextEncoder",
          "document",
          "window",
        ].map((name) => [name, "readonly"]),
      ),
    },
    rules: { "max-lines": ["error", 400] },
  },
);
