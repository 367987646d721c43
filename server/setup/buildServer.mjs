// Bundles the server and the mail fake into dist-server; packages stay in node_modules.
import { rmSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { build } from 'esbuild'

const root = fileURLToPath(new URL('../..', import.meta.url))
const out = `${root}dist-server`

rmSync(out, { recursive: true, force: true })
await build({
  absWorkingDir: root,
  // Three programs: the first starts the others as processes of their own (mailFakeProcess.ts, seedProcess.ts).
  entryPoints: {
    main: 'server/main.ts',
    mailFake: 'fake-services/mail/main.ts',
    seed: 'server/seeds/main.ts',
  },
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
