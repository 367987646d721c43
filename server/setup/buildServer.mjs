// Bundles the server and the mail fake into dist-server; packages stay in node_modules.
import { rmSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { build } from 'esbuild'

const root = fileURLToPath(new URL('../..', import.meta.url))
const out = `${root}dist-server`

rmSync(out, { recursive: true, force: true })
await build({
  absWorkingDir: root,
  // Two programs: the second is started by the first as a process of its own (mailFakeProcess.ts).
  entryPoints: { main: 'server/main.ts', mailFake: 'fake-services/mail/main.ts' },
  outdir: out,
  bundle: true,
  packages: 'external',
  platform: 'node',
  target: 'node20',
  format: 'esm',
  splitting: true,
  sourcemap: true,
  legalComments: 'none',
  tsconfig: 'tsconfig.json',
  logLevel: 'warning',
})
