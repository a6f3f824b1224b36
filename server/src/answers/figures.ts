/**
 * How figures are written for people: few digits, a real minus sign, units that fit the size.
 *
 * Knows: numbers.  Must not know: what they measure beyond their unit.
 */

/** Three significant digits at most, without trailing zeros. */
export function figure(value: number): string {
  if (!Number.isFinite(value)) return value < 0 ? '−∞' : '∞';
  const size = Math.abs(value);
  const text =
    size !== 0 && (size < 1e-3 || 1e5 <= size)
      ? value.toExponential(1)
      : String(Number(value.toPrecision(3)));
  return text.replace('e+', 'e').replaceAll('-', '−');
}

/** A pKa, a pH or a log K, to one place. */
export function oneDecimal(value: number): string {
  const rounded = value.toFixed(1);
  return (Number(rounded) === 0 ? '0.0' : rounded).replace('-', '−');
}

/** A share of 1 in per cent; what is not all or nothing never reads so. */
export function percent(share: number): string {
  const value = share * 100;
  if (value <= 0) return '0 %';
  if (value < 0.01) return '< 0.01 %';
  if (99.9 < value && value < 100) return '> 99.9 %';
  return `${Number(value.toPrecision(value < 1 ? 1 : 3))} %`;
}

/** mol in the unit that keeps the number short. */
export function amountOf(mol: number): string {
  if (mol === 0) return '0 mmol';
  if (mol < 1e-5) return `${figure(mol * 1e6)} µmol`;
  return mol < 1 ? `${figure(mol * 1e3)} mmol` : `${figure(mol)} mol`;
}
