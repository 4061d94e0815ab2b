/** A number as people type it, with a point or a comma; null for nothing, NaN for what is no number. */
export function typedNumber(text: string): number | null {
  const trimmed = text.trim();
  if (trimmed === '') return null;
  return /^[+-]?(\d+[.,]?\d*|[.,]\d+)(e[+-]?\d+)?$/i.test(trimmed)
    ? Number(trimmed.replace(',', '.'))
    : NaN;
}
