/** Bundles the command line with its packages into `dist/cli`: few files are read faster than some hundred. */
import { rmSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { build } from 'esbuild';

const root = fileURLToPath(new URL('..', import.meta.url));

// The compiler's own output of these files, and parts of an earlier bundle.
rmSync(`${root}dist/cli`, { recursive: true, force: true });

await build({
  absWorkingDir: root,
  entryPoints: ['src/cli/main.ts'],
  outdir: 'dist/cli',
  bundle: true,
  format: 'esm',
  platform: 'node',
  target: 'node20.19',
  // What a command imports only when it runs, such as the library, is a part of its own.
  splitting: true,
  chunkNames: 'part-[hash]',
  sourcemap: true,
  sourcesContent: false,
  alias: { 'string-width': './.build/later-string-width.cjs' },
  // It asks for its own file name, which a bundle has none of.
  external: ['write-file-atomic'],
  // Packages in the older form ask Node's modules by `require`.
  banner: {
    js: "import { createRequire } from 'node:module'; const require = createRequire(import.meta.url);",
  },
  logLevel: 'warning',
});
