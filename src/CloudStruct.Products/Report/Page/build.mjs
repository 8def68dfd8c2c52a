// Bundles the page into one script and one style sheet, without anything that is fetched at run time.
// Usage: node build.mjs FOLDER
import { build } from 'esbuild';

const folder = process.argv[2] ?? 'dist';
await build({
  entryPoints: { page: 'src/main.ts' },
  bundle: true,
  minify: true,
  format: 'iife',
  target: 'es2022',
  charset: 'utf8',
  legalComments: 'inline',
  outdir: folder,
  logLevel: 'warning',
});
