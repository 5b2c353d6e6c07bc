import sharp, { type Exif, type Sharp } from 'sharp';
import { overdeclaredPng, storedZip } from './bytes';
import type { Files } from './folder';
import { lookFrom } from './picture/camera';
import { exifOf } from './picture/photograph';
import { seededRandom } from './random';

/** Files that an intake must refuse, or take with a warning, each for one reason. */
const HEADER =
  'Pt No,Code,String,Seq,X loc [m],Y loc [m],H [m],s(X) [mm],s(Y) [mm],s(H) [mm],Remark';

const lines = (...rows: string[]): string => rows.map((row) => `${row}\r\n`).join('');

const BAD_ROWS = lines(
  HEADER,
  '101,YM,T1,1,3.218,-2.461,31.43,20,20,10,good row',
  '102,YM,T1,2,three point seven,-2.302,31.43,20,20,10,text in a number',
  '103,YM,T1,3,4.195,,31.43,20,20,10,missing coordinate',
  '104,YM,T1,4,NaN,-1.998,31.43,20,20,10,not a number',
  '105,YM,T1,5,1e400,-1.998,31.43,20,20,10,infinite',
  '101,YM,T1,6,5.170,-1.846,31.43,20,20,10,point number used twice',
  '106,YM,T1,7,5.655,-1.692,31.43,0,20,10,standard deviation of nought',
  '107,YM,T1,8,6.142,-1.540,31.43,-20,20,10,negative standard deviation',
  '108,YM,T1,9,6.630,-1.388,31.43,20,20,10,one,field,too many',
  '109,YM,T1',
  '110,YM,T1,11,7.604,-1.081,31.43,20,20,10,good row',
);

const DECIMAL_COMMAS = lines(
  HEADER.replaceAll(',', ';'),
  '101;YM;T1;1;3,218;-2,461;31,43;20;20;10;begin',
  '102;YM;T1;2;3,704;-2,302;31,43;20;20;10;',
  '103;YM;T1;3;4,195;-2,149;31,44;20;20;10;',
  '104;YM;T1;4;1.004,681;-1,998;31,44;20;20;10;with a thousands point',
);

const FORMULAS = lines(
  HEADER,
  '101,YM,T1,1,3.218,-2.461,31.43,20,20,10,"=HYPERLINK(""https://quellmere.example/x"",""open"")"',
  '102,YM,T1,2,3.704,-2.302,31.43,20,20,10,"=1+1"',
  '103,YM,T1,3,4.195,-2.149,31.43,20,20,10,"@SUM(A1:A9)"',
  '"+104",YM,T1,4,4.681,-1.998,31.43,20,20,10,"-2+3"',
  '105,YM,"=T1",5,5.170,-1.846,31.43,20,20,10,"\t=tab before"',
);

const WINDOWS_1252 = lines(
  HEADER,
  '101,YM,T1,1,3.218,-2.461,31.43,20,20,10,B\u00f6schung 4\u00b0',
  '102,YM,T1,2,3.704,-2.302,31.43,20,20,10,\u00e0 c\u00f4t\u00e9 du fosse \u00b1 2 cm',
);

const WRONG_COLUMNS = lines(
  'Invoice,Customer,Net,Tax,Total',
  '4471,Quellmere Canteen,18.20,3.64,21.84',
  '4472,Quellmere Canteen,22.90,4.58,27.48',
);

const HTML = `<!doctype html>
<html><body><h1>Not a picture</h1><script>document.title = 'ran';</script></body></html>
`;

const SVG = `<svg xmlns="http://www.w3.org/2000/svg" width="200" height="100" onload="document.title='ran'">
  <script>document.title = 'ran';</script>
  <foreignObject width="200" height="100"><body xmlns="http://www.w3.org/1999/xhtml">text</body></foreignObject>
  <rect width="200" height="100" fill="none" stroke="black"/>
</svg>
`;

/** `scenePhotograph`: a real photograph of the bend, from which the doubtful ones are made. */
export async function badInput(scenePhotograph: Buffer): Promise<Files> {
  const random = seededRandom(99);
  const junk = Buffer.from(Array.from({ length: 4096 }, () => Math.floor(random.uniform() * 256)));
  const small = (): Sharp => sharp(scenePhotograph).resize(640);
  const camera = lookFrom({ eye: [0, -8, 1.7], target: [6, -2, 0], focalLength: 28 });
  const exposure = {
    takenAt: '2026:10:17 15:04:37',
    utcOffset: '-08:00',
    latitude: -47.5201,
    longitude: -120.2096,
    altitude: 31,
    seed: 1,
  };
  const picture = (exif: Exif): Promise<Buffer> =>
    small().withExif(exif).jpeg({ quality: 75 }).toBuffer();
  const whole = await picture(exifOf(camera, exposure));
  const far = exifOf(camera, { ...exposure, latitude: -12.0344, longitude: -95.5021 });
  const clock = exifOf(camera, { ...exposure, takenAt: '2019:01:01 00:00:09' });
  const edited = exifOf(camera, { ...exposure, software: 'Marl Retouch 4.2 (edited)' });
  return new Map([
    ['survey-binary-junk.csv', junk],
    ['survey-wrong-columns.csv', Buffer.from(WRONG_COLUMNS)],
    ['survey-bad-rows.csv', Buffer.from(BAD_ROWS)],
    ['survey-decimal-commas.csv', Buffer.from(DECIMAL_COMMAS)],
    ['survey-formulas.csv', Buffer.from(FORMULAS)],
    ['survey-windows-1252.csv', Buffer.from(WINDOWS_1252, 'latin1')],
    ['photograph-empty.jpg', Buffer.alloc(0)],
    ['photograph-truncated.jpg', whole.subarray(0, Math.floor(whole.length * 0.4))],
    ['photograph-far-away.jpg', await picture(far)],
    ['photograph-wrong-clock.jpg', await picture(clock)],
    ['photograph-edited.jpg', await picture(edited)],
    ['archive-named.jpg', storedZip([['notes.txt', 'This is a ZIP archive, not a picture.\n']])],
    ['page-named.png', Buffer.from(HTML)],
    ['drawing-with-script.svg', Buffer.from(SVG)],
    ['pixels-60000.png', overdeclaredPng(60000, 60000)],
    [
      'traversal-names.zip',
      storedZip([
        ['../../outside.txt', 'must not land outside\n'],
        ['/absolute.txt', 'must not land at the root\n'],
        ['C:\\drive.txt', 'must not name a drive\n'],
        ['folder/../../up.txt', 'must not climb\n'],
      ]),
    ],
  ]);
}
