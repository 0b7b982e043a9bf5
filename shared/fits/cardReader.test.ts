import { readCards } from './cardReader';

const read = (...cards: string[]) => readCards(cards.map((c) => c.padEnd(80)).join(''));

describe('readCards', () => {
  it.each([
    ['an integer', 'NAXIS1  =                   48', 48],
    ['a number that starts anywhere', 'CRVAL1  = +118.', 118],
    ['a number with a comment glued to it', 'CDELT1  = -0.05/step', -0.05],
    ['a card without the blank after its sign of equality', 'CDELT1  =-0.05', null],
    ['a D exponent', 'CRVAL1  = 1.18D2', 118],
    ['a lower-case exponent', 'CRVAL1  = 1.18d2', 118],
    ['a negative exponent', "CDELT2  =              1.0E-01 / '", 0.1],
    ['a logical', 'SIMPLE  =                    T / standard', true],
    ['a logical with a comment glued to it', 'SIMPLE  =                    F/ no', false],
    ['a string', "CTYPE1  = 'GLON-CAR'           / axis", 'GLON-CAR'],
    ['a string with a slash and quotes', "OBSERVER= 'O''PQ / RS'        / it''s", "O'PQ / RS"],
    ['a string that is only quotes', "NOTE    = ''''", "'"],
    ['an empty string', "NOTE    = ''", ''],
    ['a string that is never closed', "NOTE    = 'open", 'open'],
    ['a number with text behind it', 'CRVAL3  = 12 km', NaN],
    ['no value', 'CRVAL3  =', null],
    ['no value but a comment', 'CRVAL3  =   / unknown', null],
  ])('reads %s', (_what, card, value) => {
    expect(read(card)[0]!.value).toBe(value);
  });

  it('parts value and comment at the first slash outside quotes', () => {
    expect(read("A       = 'x / y' / one / two")[0]!.comment).toBe('one / two');
    expect(read('B       = 5 / m/s')[0]).toMatchObject({ value: 5, comment: 'm/s' });
  });

  it('joins CONTINUE cards, and leaves one that continues nothing alone', () => {
    const cards = read(
      "OBSNOTE = 'first ''part'' &'",
      "CONTINUE  'second&' / a",
      "CONTINUE  '' / b",
      "CONTINUE  'stray'",
    );
    expect(cards[0]).toMatchObject({ value: "first 'part' second", comment: 'a b' });
    expect(cards[1]!.keyword).toBe('CONTINUE');
  });

  it('keeps HIERARCH names apart from the standard keywords', () => {
    const [card] = read("HIERARCH LAB RX1 CTYPE3 = 'not an axis' / [K] receiver");
    expect(card).toMatchObject({
      keyword: 'HIERARCH LAB RX1 CTYPE3',
      value: 'not an axis',
      comment: '[K] receiver',
    });
  });

  it('keeps commentary, and stops at END', () => {
    const cards = read('COMMENT = not a value', 'HISTORY  made', '        note', '', 'END', 'AFTER   = 1');
    expect(cards.map((c) => [c.keyword, c.value, c.comment])).toEqual([
      ['COMMENT', null, '= not a value'],
      ['HISTORY', null, ' made'],
      ['', null, 'note'],
    ]);
  });

  it('is not led astray by keywords that objects have by themselves', () => {
    expect(read('toString= 5')[0]!.value).toBe(5);
  });
});
