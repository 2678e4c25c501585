/** Where photos and files are kept: a folder first, another store later (decision 15). Addressed by shop and SHA-256. */
export interface BlobStore {
  /** Keeps the bytes whole or not at all; keeping the same again changes nothing. */
  put(shop: string, sha256: string, bytes: Uint8Array): Promise<void>;
  /** The bytes, or null. */
  get(shop: string, sha256: string): Promise<Uint8Array | null>;
}
