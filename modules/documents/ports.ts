import "server-only";
import { env } from "@/modules/access/env";
import { openFiles } from "@/modules/outbound/files/open";
import type { FilePort } from "@/modules/outbound/files/port";
import type { MailPort } from "@/modules/outbound/mail/port";
import { smtpMail } from "@/modules/outbound/mail/smtp";

let files: FilePort | undefined;
let mail: MailPort | undefined;

/** The file store of this installation: a folder, or S3-compatible storage. */
export function filePort(): FilePort {
  if (files) return files;
  const e = env();
  files = e.S3_BUCKET
    ? openFiles({
        kind: "s3", bucket: e.S3_BUCKET, region: e.S3_REGION, ...(e.S3_ENDPOINT ? { endpoint: e.S3_ENDPOINT } : {}),
        accessKeyId: e.S3_ACCESS_KEY_ID ?? "", secretAccessKey: e.S3_SECRET_ACCESS_KEY ?? "",
      })
    : openFiles({ kind: "folder", root: e.VK_FILES_DIR ?? "" });
  return files;
}

/** The mail server of this installation. */
export function mailPort(): MailPort {
  const from = env().VK_MAIL_FROM;
  return (mail ??= smtpMail({ url: env().SMTP_URL, from: /<([^>]+)>/.exec(from)?.[1] ?? from }));
}
