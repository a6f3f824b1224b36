/** Where the pictures of a flask put things. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { figure, oneDecimal, percent, spread, toTsv } from '../../client/src/flask-view/layout.ts';

describe('labels', () => {
  it('stay where they are while there is room', () => {
    expect(spread([10, 50, 90], 16, 0, 100)).toEqual([10, 50, 90]);
  });

  it('are moved as one where they meet', () => {
    expect(spread([50, 50], 10, 0, 100)).toEqual([45, 55]);
  });

  it('keep their order and their distance, and stay inside where they fit', () => {
    fc.assert(
      fc.property(fc.array(fc.double({ min: 0, max: 400, noNaN: true }), { maxLength: 20 }), (wanted) => {
        const places = spread(wanted, 16, 0, 400);
        const order = wanted.map((_, index) => index).sort((a, b) => wanted[a]! - wanted[b]! || a - b);
        for (let at = 1; at < order.length; at++) {
          expect(places[order[at]!]! - places[order[at - 1]!]!).toBeGreaterThan(16 - 1e-6);
        }
        for (const place of places) {
          expect(place).toBeGreaterThan(-1e-6);
          expect(place).toBeLessThan(400 + 1e-6);
        }
      }),
    );
  });
});

describe('figures', () => {
  it('carry a real minus sign and no negative nought', () => {
    expect(oneDecimal(-0.01)).toBe('0.0');
    expect(oneDecimal(-6.24)).toBe('−6.2');
    expect(figure(-0.00012)).toBe('−1.2e−4');
  });

  it('never read as all or nothing where some is left', () => {
    expect([0, 1e-7, 0.5, 0.99999, 1].map(percent)).toEqual(['0 %', '< 0.01 %', '50 %', '> 99.9 %', '100 %']);
  });

  it('keep a table a table whatever the cells hold', () => {
    expect(
      toTsv([
        ['a\tb', 'c\r\nd'],
        ['e', 'f'],
      ]),
    ).toBe('a b\tc d\ne\tf');
  });
});
