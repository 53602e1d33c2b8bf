import { folderFiles } from "./folder";
import type { FilePort } from "./port";
import { s3Files, type S3Config } from "./s3";

export type FilesConfig = { readonly kind: "folder"; readonly root: string } | ({ readonly kind: "s3" } & S3Config);

export const openFiles = (config: FilesConfig): FilePort =>
  config.kind === "folder" ? folderFiles(config.root) : s3Files(config);
