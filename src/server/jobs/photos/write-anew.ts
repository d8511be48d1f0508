import sharp from 'sharp';
import { ApiError } from '../../errors.ts';
import { type PictureFormat, pictureFormat } from './picture-format.ts';

/** A picture of more dots is refused before it is decoded. */
export const MOST_PIXELS = 50_000_000;
/** Long edge of what is kept: enough to read a part number, small enough for bad Wi-Fi. */
const LONGEST_PX = 3_200;
const SMALL_PX = 480;
/** Decoded, fifty megapixels take 200 MB: this many at a time. */
const AT_A_TIME = 2;

export interface Picture {
  readonly bytes: Uint8Array;
  readonly width: number;
  readonly height: number;
  readonly contentType: 'image/jpeg' | 'image/png' | 'image/webp';
  /** The same small, as JPEG. */
  readonly small: Uint8Array;
}

const CONTENT_TYPES = { jpeg: 'image/jpeg', png: 'image/png', webp: 'image/webp' } as const;

const refused = (message: string) =>
  new ApiError('wrong_media_type', { message, hint: 'Send a JPEG, PNG or WebP of at most 50 megapixels.' });

let running = 0;
const waiting: (() => void)[] = [];

/**
 * Decodes a picture and writes it anew in its own format: turned upright, in sRGB, without EXIF, place, device, profile or
 * anything that was hidden in the file. What is none of the three formats never reaches the decoder.
 * @throws ApiError 415 in words
 */
export async function writeAnew(bytes: Uint8Array): Promise<Picture> {
  const format = pictureFormat(bytes);
  if (format === null) throw refused('This file is not a photo that can be kept here. Nothing was kept.');
  while (running >= AT_A_TIME) await new Promise<void>((resolve) => waiting.push(resolve));
  running += 1;
  try {
    return await write(bytes, format);
  } finally {
    running -= 1;
    waiting.shift()?.();
  }
}

async function write(bytes: Uint8Array, format: PictureFormat): Promise<Picture> {
  // Checked by hand first, as the decoder's own limit speaks of pixels in words nobody would want to read.
  const head = await sharp(bytes).metadata().catch(unreadable);
  if (head.format !== format)
    throw refused('This file is not the picture that it begins as. Nothing was kept.');
  if (head.width * head.height > MOST_PIXELS) {
    const megapixels = Math.round((head.width * head.height) / 1e6);
    throw refused(`This picture has ${megapixels} megapixels, more than is taken here. Nothing was kept.`);
  }
  try {
    const upright = sharp(bytes, { failOn: 'error', limitInputPixels: MOST_PIXELS, pages: 1 }).rotate();
    const inside = { fit: 'inside', withoutEnlargement: true } as const;
    const kept = upright.clone().resize(LONGEST_PX, LONGEST_PX, inside);
    const small = upright.clone().resize(SMALL_PX, SMALL_PX, inside).flatten({ background: '#ffffff' });
    const { data, info } = await encode(kept, format).toBuffer({ resolveWithObject: true });
    return {
      bytes: data,
      width: info.width,
      height: info.height,
      contentType: CONTENT_TYPES[format],
      small: await small.jpeg({ quality: 78 }).toBuffer(),
    };
  } catch (cause) {
    return unreadable(cause);
  }
}

function encode(picture: sharp.Sharp, format: PictureFormat): sharp.Sharp {
  if (format === 'jpeg') return picture.jpeg({ quality: 86 });
  return format === 'png' ? picture.png({ compressionLevel: 8 }) : picture.webp({ quality: 86 });
}

const unreadable = (cause: unknown): never => {
  throw new ApiError('wrong_media_type', {
    message: 'This picture is damaged or broken off, and could not be read to its end. Nothing was kept.',
    hint: 'Take it again, or save it anew and send that.',
    cause,
  });
};
