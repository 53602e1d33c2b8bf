import { createHash } from "node:crypto";
import {
  DeleteObjectCommand, GetObjectCommand, HeadObjectCommand, PutObjectCommand, S3Client, S3ServiceException,
} from "@aws-sdk/client-s3";
import { checkKey, FileTaken, type FilePort } from "./port";

export interface S3Config {
  readonly bucket: string;
  /** Left out for the provider's own address. */
  readonly endpoint?: string;
  readonly region: string;
  readonly accessKeyId: string;
  readonly secretAccessKey: string;
}

const statusOf = (error: unknown): number | undefined =>
  error instanceof S3ServiceException ? error.$metadata.httpStatusCode : undefined;

/** Files in a bucket of an S3-compatible store. */
export function s3Files(config: S3Config): FilePort {
  const client = new S3Client({
    region: config.region,
    ...(config.endpoint === undefined ? {} : { endpoint: config.endpoint }),
    credentials: { accessKeyId: config.accessKeyId, secretAccessKey: config.secretAccessKey },
    forcePathStyle: true,
    // Several compatible stores keep the default checksum framing as part of the file.
    requestChecksumCalculation: "WHEN_REQUIRED",
    responseChecksumValidation: "WHEN_REQUIRED",
    maxAttempts: 3,
    requestHandler: { connectionTimeout: 3000, requestTimeout: 15_000 },
  });
  const place = (key: string) => ({ Bucket: config.bucket, Key: checkKey(key) });

  return {
    async put(key, bytes, mime) {
      try {
        await client.send(new PutObjectCommand({ ...place(key), Body: bytes, ContentType: mime, IfNoneMatch: "*" }));
      } catch (error) {
        throw statusOf(error) === 412 ? new FileTaken(key) : error;
      }
      return { key, size: bytes.byteLength, sha256: createHash("sha256").update(bytes).digest("hex") };
    },
    async get(key) {
      try {
        const { Body } = await client.send(new GetObjectCommand(place(key)));
        return Body === undefined ? null : Buffer.from(await Body.transformToByteArray());
      } catch (error) {
        if (statusOf(error) === 404) return null;
        throw error;
      }
    },
    async exists(key) {
      try {
        await client.send(new HeadObjectCommand(place(key)));
        return true;
      } catch (error) {
        if (statusOf(error) === 404) return false;
        throw error;
      }
    },
    async delete(key) {
      await client.send(new DeleteObjectCommand(place(key)));
    },
  };
}
