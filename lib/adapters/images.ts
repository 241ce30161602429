import 'server-only';
import sharp from 'sharp';
import { AppError } from '@/lib/errors';

/** A picture made anew: turned upright, without anything that the camera wrote into it. */
export interface CleanImage {
  readonly bytes: Buffer;
  readonly type: 'image/jpeg' | 'image/png' | 'image/webp';
  readonly width: number;
  readonly height: number;
  readonly small: Buffer;
}

const FORMATS = { jpeg: 'image/jpeg', png: 'image/png', webp: 'image/webp' } as const;
const LIMITS = { limitInputPixels: 50_000_000, failOn: 'error' } as const;

/** Makes a picture anew with a small one beside it. @throws AppError invalid for what is no picture, or one too large to open. */
export async function cleanImage(raw: Buffer): Promise<CleanImage> {
  try {
    const { format } = await sharp(raw, LIMITS).metadata();
    if (!(format in FORMATS)) throw new Error(format);
    const kept = format as keyof typeof FORMATS;
    const { data, info } = await sharp(raw, LIMITS)
      .rotate()
      .resize(2400, 2400, { fit: 'inside', withoutEnlargement: true })
      .toFormat(kept)
      .toBuffer({ resolveWithObject: true });
    const small = await sharp(data)
      .resize(320, 320, { fit: 'inside', withoutEnlargement: true })
      .webp()
      .toBuffer();
    return { bytes: data, type: FORMATS[kept], width: info.width, height: info.height, small };
  } catch {
    throw new AppError('invalid', 'This picture cannot be opened. Send it as JPEG, PNG or WebP.');
  }
}
