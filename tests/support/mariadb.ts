import { mkdtempSync, readdirSync, readFileSync, rmSync, statfsSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { startMariaDb, type MariaDb } from '../../server/setup/mariadb.ts'
import { livingProcess } from '../../server/setup/processes.ts'

const prefix = 'fanflower-test-'

/** Memory is the fastest disk, but containers often give /dev/shm no more than 64 MB. */
function roomyFolder(): string {
  try {
    const { bavail, bsize } = statfsSync('/dev/shm')
    return bavail * bsize > 1024 ** 3 ? '/dev/shm' : tmpdir()
  } catch {
    return tmpdir()
  }
}

/** Folders of earlier runs that were killed before they could tidy up. */
function removeLeftOvers(folder: string): void {
  for (const name of readdirSync(folder).filter((entry) => entry.startsWith(prefix))) {
    try {
      const owner = readFileSync(join(folder, name, 'owner'), 'utf8')
      if (livingProcess(owner) === null) rmSync(join(folder, name), { recursive: true, force: true })
    } catch {
      // No owner yet: a run that is just starting. It is left alone.
    }
  }
}

/**
 * Starts a MariaDB for tests that leaves nothing behind after `remove`. Its accounts reach every database whose name
 * begins with `test_`. With `folder` an earlier one is started again, for tests of crashes.
 */
export async function startTestMariaDb(
  folder = mkdtempSync(join(roomyFolder(), prefix)),
  port: number | null = null,
): Promise<MariaDb & { folder: string; remove: () => Promise<void> }> {
  removeLeftOvers(roomyFolder())
  const mariadb = await startMariaDb({
    dataDir: folder,
    port,
    durability: 'throwaway',
    databases: 'test\\_%',
  })
  const remove = async () => {
    await mariadb.stop()
    rmSync(folder, { recursive: true, force: true })
  }
  return { ...mariadb, folder, remove }
}
