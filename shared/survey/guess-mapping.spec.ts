import { describe, expect, it } from '@jest/globals';
import { codesIn, guessMapping } from './guess-mapping';

describe('the guess of how a survey file is read', () => {
  it('knows columns and units from the header', () => {
    const guess = guessMapping(
      'Pt No,Code,String,Seq,X loc [m],Y loc [m],H [m],s(X) [mm],s(Y) [mm],s(H) [mm],Remark\r\n' +
        '9001,CP,,,-8.200,-10.400,31.42,3,3,10,nail\r\n101,TM,T1,1,0.1,0.2,,20,20,,start\r\n',
    );
    expect(guess).toEqual({
      headers: expect.any(Array),
      delimiter: ',',
      decimal: '.',
      unit: 'm',
      sigmaUnit: 'mm',
      columns: {
        label: 'Pt No',
        x: 'X loc [m]',
        y: 'Y loc [m]',
        height: 'H [m]',
        sigmaX: 's(X) [mm]',
        sigmaY: 's(Y) [mm]',
        code: 'Code',
        trace: 'String',
        order: 'Seq',
        note: 'Remark',
      },
      codes: [
        { code: 'CP', count: 1, kind: 'control point' },
        { code: 'TM', count: 1, kind: 'tyre mark' },
      ],
      questions: [],
    });
  });

  it.each([
    ['Name;Easting (m);Northing (m);sigma (mm)', 'Easting (m)', 'Northing (m)', 'm', 'mm'],
    ['id\tE [mm]\tN [mm]\tsE [mm]\tsN [mm]', 'E [mm]', 'N [mm]', 'mm', 'mm'],
    ['Point,x_ft,y_ft,sd [in]', 'x_ft', 'y_ft', 'ft', 'in'],
    ['label,North [m],East [m],u [m]', 'East [m]', 'North [m]', 'm', 'm'],
  ])('reads the header %j', (header, x, y, unit, sigmaUnit) => {
    const delimiter = [';', '\t', ','].find((sign) => header.includes(sign)) ?? '';
    const guess = guessMapping(
      `${header}\n${['1', '2', '3', '4', '5'].slice(0, header.split(delimiter).length).join(delimiter)}\n`,
    );
    expect(guess).toMatchObject({ delimiter, unit, sigmaUnit, decimal: '.', columns: { x, y } });
  });

  it('asks instead of guessing what a lone comma means', () => {
    const guess = guessMapping('Point;E [m];N [m]\n1;12,500;3,250\n');
    expect(guess.delimiter).toBe(';');
    expect(guess.decimal).toBeNull();
    expect(guess.questions[0]).toBe(
      'Is the comma in "12,500" the decimal sign? A comma alone can mean two things.',
    );
  });

  it('asks for units that the header does not state, or states differently', () => {
    expect(guessMapping('Point,E,N,s\n1,2,3,4\n')).toMatchObject({ unit: null, sigmaUnit: null });
    const mixed = guessMapping('Point,E [m],N [mm]\n1,2,3\n');
    expect(mixed.unit).toBeNull();
    expect(mixed.questions).toHaveLength(2);
    expect(mixed.questions[1]).toMatch(/no column/);
  });

  it('leaves unknown codes to the person', () => {
    const guess = guessMapping('Point,E [m],N [m],Code\n1,2,3,gouge\n2,2,3,K7\n3,2,3,\n');
    expect(guess.codes).toEqual([
      { code: 'gouge', count: 1, kind: 'gouge' },
      { code: 'K7', count: 1, kind: null },
      { code: '', count: 1, kind: null },
    ]);
  });

  it('can be made for another delimiter and another column of codes', () => {
    const text = 'Point;E [m];N [m];Layer\n1;2;3;gouge\n2;3;4;gouge\n';
    expect(guessMapping(text, ';').headers).toHaveLength(4);
    expect(() => guessMapping(text, ',')).toThrow(/no columns/);
    expect(codesIn(text, ';', 'Layer')).toEqual([{ code: 'gouge', count: 2, kind: 'gouge' }]);
    expect(codesIn(text, ';', 'Nothing')).toEqual([]);
  });

  it('is refused for what has no header or no columns', () => {
    expect(() => guessMapping('just a line of prose\nand another\n')).toThrow(/no columns/);
    expect(() => guessMapping('1,2,3\n4,5,6\n')).toThrow(/no header/);
    expect(() => guessMapping('\u0000\u0001\u0002')).toThrow(/not a text file/);
    expect(() => guessMapping('  \n')).toThrow(/empty/);
  });
});
