import { readFileSync } from 'node:fs'
import sharp from 'sharp'
import { median, type BenchServer } from './servers.ts'

const megabyte = 1024 * 1024
const cap = 10 * megabyte

const residentBytes = (pid: number): number =>
  Number(/VmRSS:\s+(\d+) kB/.exec(readFileSync(`/proc/${pid}/status`, 'utf8'))?.[1] ?? Number.NaN) * 1024

const details = {
  takenOn: '2026-09-01',
  task: 'copy',
  script: 'print',
  seconds: null,
  letters: null,
  legibleLetters: null,
  reversals: null,
  smudge: null,
  lineAdherence: null,
  otherChildVisible: false,
  note: null,
}

interface Uploader {
  server: BenchServer
  cookie: string
  userId: string
  childId: string
}

const send = async (
  { server, cookie, userId, childId }: Uploader,
  file: Buffer,
  name: string,
): Promise<number> => {
  const form = new FormData()
  form.append('details', JSON.stringify(details))
  form.append('file', new Blob([new Uint8Array(file)], { type: 'image/png' }), name)
  // A body that is far too long may be cut off while it is being sent: that is a refusal too.
  const response = await fetch(`${server.url}/api/children/${childId}/samples`, {
    method: 'POST',
    headers: { cookie, 'X-Fanflower-User': userId },
    body: form,
  }).catch(() => null)
  return response?.status ?? 0
}

const pagesWhile = async ({ server, cookie }: Uploader, work: Promise<unknown>): Promise<number[]> => {
  let going = true
  void work.finally(() => (going = false)).catch(() => undefined)
  const times: number[] = []
  while (going) {
    const started = performance.now()
    await (await fetch(`${server.url}/api/caseload?size=25`, { headers: { cookie } })).text()
    times.push(performance.now() - started)
  }
  return times
}

const picture = (width: number, height: number) =>
  sharp({ create: { width, height, channels: 3, background: '#ffffff' }, limitInputPixels: false })
    .png()
    .toBuffer()

/** Memory and other pages while files come in: over the limit, bombs, and five of the largest pictures at once. */
export const measureUploads = async (uploader: Uploader) => {
  const pid = uploader.server.child.pid ?? 0
  const idle = await pagesWhile(uploader, new Promise((resolve) => setTimeout(resolve, 3000)))
  const atRest = residentBytes(pid)
  let highest = atRest
  const watch = setInterval(() => (highest = Math.max(highest, residentBytes(pid))), 20)
  const answers = new Map<number, number>()
  const count = (status: number) => answers.set(status, (answers.get(status) ?? 0) + 1)
  for (let n = 0; n < 20; n += 1) count(await send(uploader, Buffer.alloc(cap + megabyte), 'large.png'))
  const overLimit = highest - atRest
  const bomb = await picture(16_000, 16_000)
  const largest = await picture(6_240, 6_240)
  const five = (file: Buffer) =>
    Promise.all(Array.from({ length: 5 }, async () => count(await send(uploader, file, 'five.png'))))
  const beside = [...(await pagesWhile(uploader, five(bomb))), ...(await pagesWhile(uploader, five(largest)))]
  clearInterval(watch)
  return {
    answers: Object.fromEntries(answers),
    overLimitRise: overLimit / cap,
    decodedRise: (highest - atRest) / cap,
    idleP50: median(idle),
    besideP99: beside.toSorted((a, b) => a - b)[Math.floor(beside.length * 0.99)] ?? Number.NaN,
  }
}
