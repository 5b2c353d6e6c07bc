import sharp, { type Exif } from 'sharp';
import { seededRandom } from '../random';
import { type Camera, IMAGE } from './camera';
import { type Stage, render } from './render';

/** What a camera writes into a photograph besides the picture. */
export interface Exposure {
  /** Local time of the camera's clock, "2026:10:17 15:02:11", and its offset from UTC. */
  takenAt: string;
  utcOffset: string;
  latitude: number;
  longitude: number;
  altitude: number;
  /** Seed of the sensor's noise. */
  seed: number;
  software?: string;
  keywords?: string;
}

const MAKER = 'Quellmere Optics';
const MODEL = 'QF 24-70';

/** Degrees, minutes and hundredths of a second as EXIF rationals. */
function sexagesimal(degrees: number): string {
  const hundredths = Math.round(Math.abs(degrees) * 360000);
  const whole = Math.floor(hundredths / 360000);
  const minutes = Math.floor((hundredths % 360000) / 6000);
  return `${whole}/1 ${minutes}/1 ${hundredths % 6000}/100`;
}

/** UTC date and time of a local EXIF time, for the GPS stamps. */
export function utcOf(takenAt: string, utcOffset: string): string {
  const [date, time] = takenAt.split(' ');
  return new Date(`${date.replaceAll(':', '-')}T${time}${utcOffset}`).toISOString();
}

export function exifOf(camera: Camera, exposure: Exposure): Exif {
  const utc = utcOf(exposure.takenAt, exposure.utcOffset);
  const [hours, minutes, seconds] = utc.slice(11, 19).split(':').map(Number);
  const focal = camera.pose.focalLength;
  return {
    IFD0: {
      Make: MAKER,
      Model: MODEL,
      Orientation: '1',
      Software: exposure.software ?? 'QF firmware 1.8',
      DateTime: exposure.takenAt,
      Copyright: 'Quellmere Reconstruction Laboratory (synthetic picture)',
    },
    IFD2: {
      DateTimeOriginal: exposure.takenAt,
      DateTimeDigitized: exposure.takenAt,
      OffsetTimeOriginal: exposure.utcOffset,
      FocalLength: `${Math.round(focal * 10)}/10`,
      FocalLengthIn35mmFilm: String(Math.round(focal)),
      LensModel: 'QF 24-70 mm',
      ExposureTime: '1/200',
      FNumber: '56/10',
      ISOSpeedRatings: '200',
      ColorSpace: '1',
    },
    IFD3: {
      GPSLatitudeRef: exposure.latitude < 0 ? 'S' : 'N',
      GPSLatitude: sexagesimal(exposure.latitude),
      GPSLongitudeRef: exposure.longitude < 0 ? 'W' : 'E',
      GPSLongitude: sexagesimal(exposure.longitude),
      GPSAltitudeRef: '0',
      GPSAltitude: `${Math.round(exposure.altitude * 10)}/10`,
      GPSDateStamp: utc.slice(0, 10).replaceAll('-', ':'),
      GPSTimeStamp: `${hours}/1 ${minutes}/1 ${seconds}/1`,
    },
  };
}

/** Adds what a lens and a sensor add: darker corners and grain. */
function exposed(picture: Buffer, seed: number): Buffer {
  const random = seededRandom(seed);
  const out = Buffer.alloc(picture.length);
  const corner = (IMAGE.width ** 2 + IMAGE.height ** 2) / 4;
  for (let row = 0; row < IMAGE.height; row += 1) {
    for (let column = 0; column < IMAGE.width; column += 1) {
      const offset = (column - IMAGE.width / 2) ** 2 + (row - IMAGE.height / 2) ** 2;
      const falloff = 1 - 0.26 * (offset / corner) ** 1.4;
      const grain = random.normal(3.2);
      const start = (row * IMAGE.width + column) * 3;
      for (let c = 0; c < 3; c += 1) {
        const value = picture[start + c] * falloff + grain;
        out[start + c] = Math.min(255, Math.max(0, Math.round(value)));
      }
    }
  }
  return out;
}

export async function photograph(
  stage: Stage,
  camera: Camera,
  exposure: Exposure,
): Promise<Buffer> {
  const picture = exposed(await render(stage, camera), exposure.seed);
  return sharp(picture, { raw: { width: IMAGE.width, height: IMAGE.height, channels: 3 } })
    .withExif(exifOf(camera, exposure))
    .jpeg({ quality: 78, mozjpeg: true })
    .toBuffer();
}
