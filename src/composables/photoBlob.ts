import type { NewBlob } from '@/offline/walkAct';

/** Longest side and most bytes of a photo that goes into a walk (decision 15). */
const LONGEST_SIDE = 2048;
const MOST_BYTES = 2 * 1024 * 1024;
/** Above this a file is not even opened: a camera makes no such photo, and it would fill the tablet's memory. */
const MOST_FILE_BYTES = 80 * 1024 * 1024;

/** Why a file cannot be a photo of this walk. */
export type PhotoProblem = 'photo.tooLarge' | 'photo.notAPhoto';

/** A photo made small, without what the camera wrote into it (place, owner), or why not. */
export type PhotoResult = { ok: true; blob: NewBlob } | { ok: false; code: PhotoProblem };

const hex = (bytes: ArrayBuffer): string =>
  Array.from(new Uint8Array(bytes), (byte) => byte.toString(16).padStart(2, '0')).join('');

async function drawn(file: Blob): Promise<HTMLCanvasElement | null> {
  let bitmap: ImageBitmap;
  try {
    bitmap = await createImageBitmap(file);
  } catch {
    // Not an image, or cut off: the person is told and takes it again.
    return null;
  }
  const scale = Math.min(1, LONGEST_SIDE / Math.max(bitmap.width, bitmap.height));
  const canvas = document.createElement('canvas');
  canvas.width = Math.max(1, Math.round(bitmap.width * scale));
  canvas.height = Math.max(1, Math.round(bitmap.height * scale));
  canvas.getContext('2d')?.drawImage(bitmap, 0, 0, canvas.width, canvas.height);
  bitmap.close();
  return canvas;
}

const jpegOf = (canvas: HTMLCanvasElement, quality: number): Promise<Blob | null> =>
  new Promise((resolve) => canvas.toBlob(resolve, 'image/jpeg', quality));

/** Scales a photo and draws it anew, so that nothing but the picture is kept; its SHA-256 names it in the record. */
export async function photoBlob(file: Blob): Promise<PhotoResult> {
  if (file.size > MOST_FILE_BYTES) return { ok: false, code: 'photo.tooLarge' };
  const canvas = await drawn(file);
  if (!canvas) return { ok: false, code: 'photo.notAPhoto' };
  for (const quality of [0.85, 0.7, 0.5, 0.3]) {
    const jpeg = await jpegOf(canvas, quality);
    if (!jpeg || jpeg.size > MOST_BYTES) continue;
    const bytes = await jpeg.arrayBuffer();
    const sha256 = hex(await crypto.subtle.digest('SHA-256', bytes));
    return { ok: true, blob: { sha256, contentType: 'image/jpeg', bytes } };
  }
  return { ok: false, code: 'photo.tooLarge' };
}
