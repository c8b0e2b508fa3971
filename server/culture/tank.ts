/** Water in a vessel from its inside measures. */

/** Litres of a box (length, width, depth), a round tank or a cone (diameter, depth); lengths in dm. */
export function tankLitres(shape: "box" | "round" | "cone", lengths: readonly number[]): number {
  const [first = 0, second = 0, third = 0] = lengths;
  if (shape === "box") return first * second * third;
  const circle = (Math.PI * first * first) / 4;
  return shape === "round" ? circle * second : (circle * second) / 3;
}
