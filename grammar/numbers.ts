/** Plain numbers, and what other ways of writing one may have meant. Nothing here computes with them. */

const plain = /^[-+−]?\d+(\.\d+)?$/;

/** The number with `-` for every minus sign and no plus, or null where it isn't written plainly. */
export const plainNumber = (text: string): string | null =>
  plain.test(text) ? text.replace("−", "-").replace("+", "") : null;

/** The plain numbers that this word may have meant, likeliest first; none where nothing sensible is left. */
export function numberReadings(text: string): readonly string[] {
  const sign = /^[-−]/.test(text) ? "-" : "";
  const digits = text
    .replace(/^[-+−]/, "")
    .replace(/[\s'’]/g, "")
    .replace(/\.$/, "");
  return readingsOfDigits(digits).map((reading) => sign + reading);
}

function readingsOfDigits(digits: string): readonly string[] {
  const power = /^(.*)[eE]([-+−]?\d+)$/.exec(digits);
  if (power) {
    const exponent = Number(power[2]!.replace("−", "-"));
    return readingsOfDigits(power[1]!).flatMap((mantissa) => shifted(mantissa, exponent));
  }
  if (/^\d+(\.\d+)?$/.test(digits)) return [digits];
  if (/^[.,]\d+$/.test(digits)) return [`0.${digits.slice(1)}`];
  const parts = digits.split(/[.,]/);
  const marks = [...digits].filter((mark) => mark === "." || mark === ",");
  const grouped = (groups: readonly string[]) =>
    /^[1-9]\d{0,2}$/.test(groups[0]!) && groups.slice(1).every((group) => group.length === 3);
  const last = marks.at(-1)!;
  if (marks.length === 1) {
    const point = `${parts[0]}.${parts[1]}`;
    return grouped(parts) ? [point, parts.join("")] : [point];
  }
  const whole = parts.slice(0, -1);
  // `1.250,5`: the last mark is the point and the others part thousands.
  if (marks.slice(0, -1).every((mark) => mark !== last) && new Set(marks).size === 2)
    return grouped(whole) ? [`${whole.join("")}.${parts.at(-1)}`] : [];
  return new Set(marks).size === 1 && grouped(parts) ? [parts.join("")] : [];
}

/** Moves the point; nothing where that would print a number that nobody means. */
function shifted(mantissa: string, exponent: number): readonly string[] {
  if (Math.abs(exponent) > 12) return [];
  const [whole = "", fraction = ""] = mantissa.split(".");
  const all = "0".repeat(Math.max(0, -exponent)) + whole + fraction + "0".repeat(Math.max(0, exponent));
  const point = whole.length + exponent + Math.max(0, -exponent);
  const left = all.slice(0, point).replace(/^0+(?=\d)/, "") || "0";
  const right = all.slice(point).replace(/0+$/, "");
  return [right ? `${left}.${right}` : left];
}
