import nextVitals from "eslint-config-next/core-web-vitals";
import nextTypeScript from "eslint-config-next/typescript";

const config = [
  {
    ignores: [".next/**", ".next-test/**", ".data/**", "coverage/**", "test-results/**", "playwright-report/**", "next-env.d.ts"],
  },
  ...nextVitals,
  ...nextTypeScript,
  {
    rules: {
      "@typescript-eslint/no-unused-vars": [
        "error",
        { argsIgnorePattern: "^_", varsIgnorePattern: "^_", caughtErrorsIgnorePattern: "^_" },
      ],
      // `condition && act()` and `condition ? one() : other()` as statements are plain enough
      "@typescript-eslint/no-unused-expressions": ["error", { allowShortCircuit: true, allowTernary: true }],
      // there is no pages folder to check links against
      "@next/next/no-html-link-for-pages": "off",
      "no-console": ["error", { allow: ["warn", "error"] }],
    },
  },
  {
    // programs for a terminal: printing is what they do
    files: ["scripts/**", "db/migrate.ts", "db/seed.ts", "db/seed/**", "tests/bench/**", "tests/support/**"],
    rules: { "no-console": "off" },
  },
  {
    // a test's probe component carries a value out of the tree on purpose
    files: ["tests/**"],
    rules: { "react-hooks/immutability": "off" },
  },
];

export default config;
