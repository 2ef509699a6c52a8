import reactHooks from "eslint-plugin-react-hooks";
import tseslint from "typescript-eslint";

const root = new URL("..", import.meta.url).pathname;

export default tseslint.config(
  { ignores: ["node_modules/", ".scratch/", ".next/", ".data/", "lib/store/generated/", "tests/output/", "next-env.d.ts"] },
  {
    files: ["**/*.{ts,tsx}"],
    extends: [tseslint.configs.strictTypeChecked, tseslint.configs.stylisticTypeChecked],
    languageOptions: { parserOptions: { project: "./tsconfig.json", tsconfigRootDir: root } },
    rules: {
      eqeqeq: "error",
      "no-console": "error",
      "@typescript-eslint/consistent-type-imports": "error",
      "@typescript-eslint/no-explicit-any": "error",
      "@typescript-eslint/no-non-null-assertion": "error",
      "@typescript-eslint/switch-exhaustiveness-check": "error",
      // Numbers in a sentence are this program's trade.
      "@typescript-eslint/restrict-template-expressions": ["error", { allowNumber: true }],
      "@typescript-eslint/no-confusing-void-expression": ["error", { ignoreArrowShorthand: true }],
      "@typescript-eslint/dot-notation": ["error", { allowIndexSignaturePropertyAccess: true }],
      // Typed arrays and plain ones are both walked by index where speed asks for it.
      "@typescript-eslint/prefer-for-of": "off",
    },
  },
  {
    files: ["lib/core/**/*.ts"],
    rules: {
      "max-lines-per-function": ["error", { max: 40, skipBlankLines: true, skipComments: true }],
    },
  },
  { files: ["app/**/*.{ts,tsx}"], extends: [reactHooks.configs.flat.recommended] },
  {
    // Commands and tools speak to a terminal.
    files: ["lib/cli/**", "prisma/**", "tests/support/**", "tests/bench/**"],
    rules: { "no-console": "off" },
  },
);
