import sharp from "sharp";
import { describe, expect, it } from "vitest";
import { imageKind, PHOTO_BYTES_MAX, reencodePhoto } from "./photo";

const plain = (width: number, height: number, channels: 3 | 4 = 3) =>
  sharp({ create: { width, height, channels, background: channels === 4 ? { r: 200, g: 30, b: 30, alpha: 0.5 } : "#c81e1e" } });

async function refusal(bytes: Uint8Array): Promise<string> {
  const result = await reencodePhoto(bytes);
  expect(result.ok).toBe(false);
  return result.ok ? "" : result.refusal.message;
}

describe("a photo", () => {
  it("is turned upright, made smaller and loses what the phone wrote into it", async () => {
    const shot = await plain(3000, 1000)
      .jpeg()
      .withExif({ IFD0: { Model: "phone", Orientation: "6" }, IFD3: { GPSLatitude: "41/1 49/1 0/1" } })
      .withMetadata({ orientation: 6 })
      .toBuffer();
    expect((await sharp(shot).metadata()).exif).toBeDefined();
    const result = await reencodePhoto(shot);
    expect(result.ok).toBe(true);
    if (!result.ok) return;
    const { full, thumbnail } = result.value;
    expect([full.widthPx, full.heightPx]).toEqual([800, 2400]);
    expect([thumbnail.widthPx, thumbnail.heightPx]).toEqual([160, 480]);
    for (const picture of [full, thumbnail]) {
      const meta = await sharp(picture.bytes).metadata();
      expect(`image/${meta.format}`).toBe(picture.mime);
      expect(meta.exif).toBeUndefined();
      expect(meta.orientation).toBeUndefined();
    }
  });
  it.each(["png", "webp"] as const)("takes %s, on white where it is clear", async (format) => {
    const result = await reencodePhoto(await plain(40, 30, 4).toFormat(format).toBuffer());
    expect(result.ok).toBe(true);
    if (!result.ok) return;
    expect([result.value.full.widthPx, result.value.full.heightPx]).toEqual([40, 30]);
    const { data } = await sharp(result.value.full.bytes).raw().toBuffer({ resolveWithObject: true });
    expect(data[0]).toBeGreaterThan(200);
    expect(data[1]).toBeGreaterThan(120);
  });
  it("refuses a vector file, a GIF and text, whatever they are called", async () => {
    const svg = Buffer.from('<svg xmlns="http://www.w3.org/2000/svg" width="9" height="9"><image href="file:///etc/passwd"/></svg>');
    const gif = await plain(9, 9).gif().toBuffer();
    for (const bytes of [svg, gif, Buffer.from("not a photo at all")]) {
      expect(await refusal(bytes)).toContain("JPEG, PNG or WebP");
    }
  });
  it("refuses HEIC and says how to send the photo instead", async () => {
    const heic = Buffer.concat([Buffer.from([0, 0, 0, 24]), Buffer.from("ftypheic"), Buffer.alloc(40)]);
    expect(await refusal(heic)).toContain("Most Compatible");
  });
  it("refuses a photo that was cut off", async () => {
    const whole = await plain(800, 600).jpeg().toBuffer();
    expect(await refusal(whole.subarray(0, Math.floor(whole.length / 2)))).toContain("cut off");
  });
  it("refuses a small file that would unfold into very many pixels", async () => {
    const bomb = await sharp({ create: { width: 10_000, height: 6001, channels: 3, background: "#000" } }).png({ compressionLevel: 9 }).toBuffer();
    expect(bomb.length).toBeLessThan(500_000);
    expect(await refusal(bomb)).toContain("60 megapixels");
  });
  it("refuses too many bytes and none", async () => {
    expect(await refusal(new Uint8Array(PHOTO_BYTES_MAX + 1))).toContain("25 MB");
    expect(await refusal(new Uint8Array(0))).toContain("empty");
  });
  it("refuses a header with nothing behind it", async () => {
    expect(await refusal(Buffer.from([0xff, 0xd8, 0xff, 0xe0, 0, 0]))).toContain("damaged");
    expect(imageKind(Buffer.from("RIFF0000WAVE"))).toBeNull();
  });
});
