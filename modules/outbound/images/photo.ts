import sharp, { type Sharp } from "sharp";
import { ok, refuse, type Result } from "@/modules/kernel/result";

// Only the three loaders below may ever see bytes that a stranger sent.
sharp.block({ operation: ["VipsForeignLoad"] });
sharp.unblock({ operation: ["VipsForeignLoadJpegBuffer", "VipsForeignLoadPngBuffer", "VipsForeignLoadWebpBuffer"] });

export interface Picture<Mime extends string = string> {
  readonly bytes: Buffer;
  readonly mime: Mime;
  readonly widthPx: number;
  readonly heightPx: number;
}

/** The picture as JPEG, which documents and mail can carry too; the thumbnail, for screens only, as WebP. */
export interface Photo {
  readonly full: Picture<"image/jpeg">;
  readonly thumbnail: Picture<"image/webp">;
}

/** Largest upload, bytes: a 48-megapixel phone photo is about 15 MB. */
export const PHOTO_BYTES_MAX = 25 * 1024 * 1024;
/** Most pixels decoded, so that a small file can't unfold into all of the memory. */
const PHOTO_PIXELS_MAX = 60_000_000;
const FULL_EDGE_PX = 2400;
const THUMBNAIL_EDGE_PX = 480;

const wanted = "Send a JPEG, PNG or WebP photo.";

const startsWith = (bytes: Uint8Array, ...signature: number[]) => signature.every((byte, i) => bytes[i] === byte);
const ascii = (bytes: Uint8Array, from: number, to: number) => String.fromCharCode(...bytes.subarray(from, to));

/** What the first bytes say, whatever the name or the sender claims. */
export function imageKind(bytes: Uint8Array): "jpeg" | "png" | "webp" | "heic" | null {
  if (startsWith(bytes, 0xff, 0xd8, 0xff)) return "jpeg";
  if (startsWith(bytes, 0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a)) return "png";
  if (ascii(bytes, 0, 4) === "RIFF" && ascii(bytes, 8, 12) === "WEBP") return "webp";
  if (ascii(bytes, 4, 8) === "ftyp" && /^(hei|hev|mif|msf)/.test(ascii(bytes, 8, 12))) return "heic";
  return null;
}

const open = (bytes: Uint8Array, edgePx: number) =>
  sharp(bytes, { limitInputPixels: PHOTO_PIXELS_MAX, failOn: "error", pages: 1 })
    .autoOrient()
    .resize({ width: edgePx, height: edgePx, fit: "inside", withoutEnlargement: true })
    .flatten({ background: "#ffffff" })
    .toColourspace("srgb");

async function picture<Mime extends string>(image: Sharp, mime: Mime): Promise<Picture<Mime>> {
  const { data, info } = await image.toBuffer({ resolveWithObject: true });
  return { bytes: data, mime, widthPx: info.width, heightPx: info.height };
}

/**
 * An uploaded photo, decoded and written anew: turned upright, at most 2400 px on its long side, without
 * the place, camera and time that the phone wrote into it; with a 480 px thumbnail. Anything that is not
 * a whole JPEG, PNG or WebP picture is refused.
 */
export async function reencodePhoto(bytes: Uint8Array): Promise<Result<Photo>> {
  if (bytes.byteLength === 0) return refuse("photo_empty", `The file is empty. ${wanted}`);
  if (bytes.byteLength > PHOTO_BYTES_MAX) return refuse("photo_too_large", "The photo is larger than 25 MB. Send a smaller one.");
  const kind = imageKind(bytes);
  if (kind === "heic") {
    return refuse("photo_kind", `This is a HEIC photo. ${wanted} On an iPhone: Settings, Camera, Formats, Most Compatible.`);
  }
  if (kind === null) return refuse("photo_kind", `This is not a photo we can read. ${wanted}`);
  try {
    const { width, height, format } = await sharp(bytes, { limitInputPixels: false }).metadata();
    if (format !== kind) return refuse("photo_kind", `This is not a photo we can read. ${wanted}`);
    if (width * height > PHOTO_PIXELS_MAX) {
      return refuse("photo_too_large", "The photo has more than 60 megapixels. Send a smaller one.");
    }
    const full = await picture(open(bytes, FULL_EDGE_PX).jpeg({ quality: 82, mozjpeg: true }), "image/jpeg");
    // From the upright copy: decoding the original a second time would cost the most.
    const thumbnail = await picture(open(full.bytes, THUMBNAIL_EDGE_PX).webp({ quality: 76 }), "image/webp");
    return ok({ full, thumbnail });
  } catch {
    return refuse("photo_damaged", "The photo is damaged or was cut off on the way. Send it again.");
  }
}
