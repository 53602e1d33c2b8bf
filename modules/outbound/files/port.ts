import { randomUUID } from "node:crypto";

export interface StoredFile {
  readonly key: string;
  readonly size: number;
  /** Hex SHA-256 of the bytes, to be kept beside the row that points here. */
  readonly sha256: string;
}

/** Where uploaded and made files are kept. A key is written once and never again. */
export interface FilePort {
  /** @throws FileTaken when the key exists */
  put(key: string, bytes: Uint8Array, mime: string): Promise<StoredFile>;
  /** Null when there is no such file. */
  get(key: string): Promise<Buffer | null>;
  exists(key: string): Promise<boolean>;
  /** Deleting what is not there is fine. */
  delete(key: string): Promise<void>;
}

export class FileTaken extends Error {
  override readonly name = "FileTaken";
  constructor(key: string) {
    super(`file key already in use: ${key}`);
  }
}

const PART = /^[a-z0-9][a-z0-9-]{0,63}$/;
const KEY = /^[a-z0-9][a-z0-9-]{0,63}(?:\/[a-z0-9][a-z0-9-]{0,63}){0,3}(?:\.[a-z0-9]{1,5})?$/;

/**
 * A fresh key `shop/kind/random.ext`. Nothing in it comes from a file name that a person chose.
 * @throws RangeError for parts that are not plain lower-case words
 */
export function newFileKey(shopId: string, kind: string, extension: string): string {
  if (!PART.test(shopId) || !PART.test(kind) || !/^[a-z0-9]{1,5}$/.test(extension)) {
    throw new RangeError("not the parts of a file key");
  }
  return `${shopId}/${kind}/${randomUUID()}.${extension}`;
}

/** @throws RangeError when a key could leave its folder or is not one of ours */
export function checkKey(key: string): string {
  if (!KEY.test(key)) throw new RangeError(`not a file key: ${JSON.stringify(key)}`);
  return key;
}
