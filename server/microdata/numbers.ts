const WITH_POINT = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;
const WITH_COMMA = /^[+-]?(?:\d+,\d*|,\d+)(?:[eE][+-]?\d+)?$/;

/**
 * A cell's number, or null where it is none: plain decimal notation only, finite.
 * @param takesComma Whether a decimal comma is taken as well, as in files separated by semicolons.
 */
export function parseNumber(cell: string, takesComma: boolean): number | null {
  const text = cell.trim();
  if (WITH_POINT.test(text)) return finite(Number(text));
  return takesComma && WITH_COMMA.test(text) ? finite(Number(text.replace(",", "."))) : null;
}

const finite = (value: number) => (Number.isFinite(value) ? value : null);
