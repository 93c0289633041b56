import { EnvironmentError } from '../errors.js';

/** The part of Node's file access that is used here. */
interface FileHandle {
  writeFile(data: Uint8Array): Promise<void>;
  sync(): Promise<void>;
  close(): Promise<void>;
}
interface FileSystem {
  open(path: string, flags: string): Promise<FileHandle>;
  readFile(path: string): Promise<Uint8Array>;
  rename(from: string, to: string): Promise<void>;
  rm(path: string, options: { force: boolean }): Promise<void>;
}

async function fileSystem(where: string): Promise<FileSystem> {
  // Held in a variable, so that bundlers for browsers do not try to resolve it.
  const name = 'node:fs/promises';
  try {
    return (await import(/* @vite-ignore */ /* webpackIgnore: true */ name)) as FileSystem;
  } catch (cause) {
    throw new EnvironmentError(
      `${where}: the platform must have files; got none; use encodeCheckpoint and decodeCheckpoint, and store the bytes yourself`,
      { cause },
    );
  }
}

/** The write under way for each path: two at once would write into the same unfinished file. */
const underWay = new Map<string, Promise<void>>();

/**
 * Writes a file so that at any moment, whatever kills the process, the path holds either the old content or
 * the new one, whole: into a file beside it, forced to the disk, then renamed over it.
 */
export async function writeWhole(where: string, path: string, bytes: Uint8Array): Promise<void> {
  const before = underWay.get(path) ?? Promise.resolve();
  const write = before.catch(() => {}).then(() => writeNow(where, path, bytes));
  underWay.set(path, write);
  try {
    await write;
  } finally {
    if (underWay.get(path) === write) underWay.delete(path);
  }
}

async function writeNow(where: string, path: string, bytes: Uint8Array): Promise<void> {
  const files = await fileSystem(where);
  const unfinished = `${path}.unfinished`;
  try {
    const handle = await files.open(unfinished, 'w');
    try {
      await handle.writeFile(bytes);
      await handle.sync();
    } finally {
      await handle.close();
    }
    await files.rename(unfinished, path);
  } catch (error) {
    await files.rm(unfinished, { force: true });
    throw error;
  }
  await syncFolder(files, path);
}

/** Forces the renaming itself to the disk, on systems that let a folder be opened for it. */
async function syncFolder(files: FileSystem, path: string): Promise<void> {
  const cut = Math.max(path.lastIndexOf('/'), path.lastIndexOf('\\'));
  try {
    const handle = await files.open(cut < 0 ? '.' : path.slice(0, cut + 1), 'r');
    try {
      await handle.sync();
    } finally {
      await handle.close();
    }
  } catch {
    // Windows does not open folders; there the renaming reaches the disk in its own time.
  }
}

/** Reads a whole file. */
export async function readWhole(where: string, path: string): Promise<Uint8Array> {
  return (await fileSystem(where)).readFile(path);
}
