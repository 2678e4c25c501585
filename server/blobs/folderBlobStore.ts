import { randomBytes } from 'node:crypto';
import { mkdir, open, readFile, rename, rm } from 'node:fs/promises';
import path from 'node:path';
import type { BlobStore } from './blobStore';

const isMissing = (error: unknown): boolean => (error as NodeJS.ErrnoException).code === 'ENOENT';

const writeDurably = async (file: string, bytes: Uint8Array): Promise<void> => {
  const handle = await open(file, 'wx');
  try {
    await handle.writeFile(bytes);
    await handle.sync();
  } finally {
    await handle.close();
  }
};

/** Blobs in a folder: written beside their place, synced, then renamed, so that no reader sees half of one. */
export const folderBlobStore = (root: string): BlobStore => {
  const placeOf = (shop: string, sha256: string) => path.join(root, shop, sha256.slice(0, 2), sha256);
  return {
    async put(shop, sha256, bytes) {
      const place = placeOf(shop, sha256);
      const unfinished = `${place}.${randomBytes(6).toString('hex')}.part`;
      await mkdir(path.dirname(place), { recursive: true });
      try {
        await writeDurably(unfinished, bytes);
        await rename(unfinished, place);
      } catch (error) {
        await rm(unfinished, { force: true });
        throw error;
      }
    },
    async get(shop, sha256) {
      try {
        return await readFile(placeOf(shop, sha256));
      } catch (error) {
        if (isMissing(error)) return null;
        throw error;
      }
    },
  };
};
