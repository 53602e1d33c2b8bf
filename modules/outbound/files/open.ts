import { folderFiles } from "./folder";
import type { FilePort } from "./port";
import type { S3Config } from "./s3";

export type FilesConfig = { readonly kind: "folder"; readonly root: string } | ({ readonly kind: "s3" } & S3Config);

/** The store that the configuration names. The large S3 library is loaded only where it is used. */
export function openFiles(config: FilesConfig): FilePort {
  if (config.kind === "folder") return folderFiles(config.root);
  let opened: Promise<FilePort> | undefined;
  const store = () => (opened ??= import("./s3").then((s3) => s3.s3Files(config)));
  return {
    put: async (key, bytes, mime) => (await store()).put(key, bytes, mime),
    get: async (key) => (await store()).get(key),
    exists: async (key) => (await store()).exists(key),
    delete: async (key) => (await store()).delete(key),
  };
}
