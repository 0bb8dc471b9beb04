import { fileURLToPath } from 'node:url';
import tseslint from 'typescript-eslint';

const basePath = fileURLToPath(new URL('../..', import.meta.url));

export default [
  { basePath, ignores: ['dist/**', 'node_modules/**', 'coverage/**'] },
  ...tseslint.configs.strictTypeChecked.map((block) => ({
    ...block,
    basePath,
    files: ['**/*.ts'],
  })),
  {
    basePath,
    files: ['**/*.ts'],
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: basePath } },
    rules: {
      eqeqeq: 'error',
      'no-console': 'error',
      'prefer-const': 'error',
      '@typescript-eslint/consistent-type-imports': 'error',
      '@typescript-eslint/restrict-template-expressions': ['error', { allowNumber: true }],
      // An index that a loop bound already proves; `?? 0` there would hide a bug.
      '@typescript-eslint/no-non-null-assertion': 'off',
    },
  },
  {
    // These folders have no tsconfig.json of their own; the tests' one covers them.
    basePath,
    files: ['datasets/**/*.ts', 'notebooks/**/*.ts'],
    languageOptions: {
      parserOptions: { projectService: false, project: `${basePath}test/tsconfig.json` },
    },
  },
];
