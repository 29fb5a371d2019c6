// Plain JavaScript, because it is used before any package is there.
import { mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';

/** Whether a process with this id exists. @param {number} pid @returns {boolean} */
export function isAlive(pid) {
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return /** @type {NodeJS.ErrnoException} */ (error).code === 'EPERM';
  }
}

/** @param {string} folder @returns {number | null} */
function holder(folder) {
  try {
    return Number(readFileSync(path.join(folder, 'pid'), 'utf8')) || null;
  } catch {
    return null;
  }
}

/**
 * Runs `work` while holding a lock that is a folder: making one is atomic on every file system. A lock whose holder
 * was killed is taken over.
 * @template T @param {string} folder @param {() => T | Promise<T>} work
 * @param {(holder: number | null) => void} [waiting] called once when somebody else holds it @returns {Promise<T>}
 */
export async function locked(folder, work, waiting) {
  let told = false;
  let nameless = 0;
  for (;;) {
    try {
      mkdirSync(folder);
      break;
    } catch (error) {
      if (/** @type {NodeJS.ErrnoException} */ (error).code !== 'EEXIST') throw error;
      const pid = holder(folder);
      // A holder writes its id right after making the folder; one without an id for two seconds died between.
      nameless = pid === null ? nameless + 1 : 0;
      if ((pid !== null && !isAlive(pid)) || nameless > 20) {
        rmSync(folder, { recursive: true, force: true });
        continue;
      }
      if (!told) waiting?.(pid);
      told = true;
      await sleep(100);
    }
  }
  writeFileSync(path.join(folder, 'pid'), String(process.pid));
  try {
    return await work();
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}
