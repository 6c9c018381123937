import {
  PERCENT,
  PLAIN,
  QUANTITIES,
  countQuantity,
  numberProblem,
  readNumber,
  readQuantity,
  readWhole,
  textOf,
} from './typed';

describe('readNumber', () => {
  it.each([
    ['12', 12],
    [' 12.5 ', 12.5],
    ['.5', 0.5],
    ['1,250', 1250],
    ['1 250.5', 1250.5],
    ['12,345,678', 12_345_678],
    ['1,5', null],
    ['1,2345', null],
    ['1.250,5', null],
    ['-3', null],
    ['1e3', null],
    ['12 cm', null],
    ['', null],
    ['.', null],
  ])('%j is %j', (text, number) => {
    expect(readNumber(text)).toBe(number);
  });

  it('takes no part for a whole', () => {
    expect(readWhole('12.5')).toBeNull();
    expect(readWhole('12')).toBe(12);
  });
});

describe('a stored value in a form', () => {
  it.each([
    [168, QUANTITIES.width.metric, '168'],
    [168, QUANTITIES.width.imperial, '66.142'],
    [20, QUANTITIES.sett.imperial, '50.8'],
    [28, QUANTITIES.mass.imperial, '0.9877'],
    [800, QUANTITIES.length.imperial, '874.89'],
    [1 / 3, PERCENT, '33.333'],
    [4.04, PLAIN, '4.04'],
    [25, countQuantity('Ne'), '23.622'],
    [25, countQuantity('lea'), '66.141'],
    [25, countQuantity('tex'), '25'],
  ])('%d is shown as it is read: %#', (stored, quantity, text) => {
    expect(textOf(stored, quantity)).toBe(text);
    expect(readQuantity(text, quantity, stored)).toBe(stored);
  });

  it('is what was typed once it is another text', () => {
    expect(readQuantity('66', QUANTITIES.width.imperial, 168)).toBeCloseTo(167.64, 10);
    expect(readQuantity('40', countQuantity('Ne'), 25)).toBeCloseTo(14.7635, 4);
  });

  it('is nothing where the text is no number', () => {
    expect(readQuantity('wide', QUANTITIES.width.metric, 168)).toBeNull();
    expect(readQuantity('0', countQuantity('Ne'))).toBeNull();
  });
});

describe('numberProblem', () => {
  it.each([
    ['', 'Type the ends, such as 3,360.'],
    ['many', '“many” is no number. Type the ends, such as 3,360.'],
    ['2,5', 'Type the decimals after a point: 2.5.'],
    ['3,360', ''],
  ])('%j: %s', (text, sentence) => {
    expect(numberProblem(text, 'the ends', '3,360')).toBe(sentence);
  });
});
