/**
 * A number as every reader takes it back to the same value: the shortest decimal that means it.
 * Whole numbers past 2⁵³ are written with an exponent, since their plain digits are refused as not
 * exact.
 */
export const numberText = (value: number): string =>
  Number.isInteger(value) && !Number.isSafeInteger(value) ? value.toExponential() : String(value);
