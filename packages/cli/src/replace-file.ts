import { randomUUID } from 'node:crypto';
import { type FileHandle, mkdir, open, rename, rm } from 'node:fs/promises';
import { basename, dirname, join } from 'node:path';
import { TailpairError } from '@tailpair/core';

/**
 * Writes a file under a temporary name in its folder and renames it once `write` is done, so that no
 * reader ever sees half a file and a failure leaves an older one as it was. Creates the folder if need be.
 *
 * @throws TailpairError `file-system` naming the path and the cause; whatever `write` throws otherwise.
 */
export async function replaceFile<Result>(
  path: string,
  write: (file: FileHandle) => Promise<Result>,
): Promise<Result> {
  const folder = dirname(path);
  const temporary = join(folder, `.${basename(path)}.${randomUUID()}.part`);
  try {
    await mkdir(folder, { recursive: true });
    const file = await open(temporary, 'wx');
    try {
      const result = await write(file).finally(() => file.close());
      await rename(temporary, path);
      return result;
    } catch (error) {
      await rm(temporary, { force: true });
      throw error;
    }
  } catch (error) {
    throw isFromSystem(error)
      ? new TailpairError('file-system', `cannot be written: ${error.message}`, { where: path })
      : error;
  }
}

function isFromSystem(error: unknown): error is NodeJS.ErrnoException {
  return error instanceof Error && 'syscall' in error;
}
