/** Finding sections and named things of all farms by a few of their letters. */
import type { Farm } from "../farm.ts";
import { type NamedSymbol, namedSymbols } from "./symbols.ts";

/** More than this nobody reads through. */
export const mostFound = 200;

export interface FoundSymbol<Where> {
  readonly symbol: NamedSymbol;
  /** What the asker knows the farm by. */
  readonly where: Where;
}

/** Those whose names hold the letters asked for in this order, best first, pausing now and then. */
export function* workspaceSymbols<Where extends { readonly farm: Farm }>(
  farms: readonly Where[],
  query: string,
): Generator<void, readonly FoundSymbol<Where>[]> {
  const found: (FoundSymbol<Where> & { readonly rank: number })[] = [];
  for (const where of farms)
    for (const file of where.farm.documents.keys())
      for (const symbol of yield* namedSymbols(where.farm, file)) {
        const rank = rankOf(query, symbol.name);
        if (rank !== null) found.push({ symbol, where, rank });
      }
  const inOrder = (left: (typeof found)[number], right: (typeof found)[number]): number =>
    left.rank - right.rank ||
    left.symbol.name.length - right.symbol.name.length ||
    (left.symbol.name < right.symbol.name ? -1 : left.symbol.name > right.symbol.name ? 1 : 0);
  return found.sort(inOrder).slice(0, mostFound);
}

/** How well a name answers a query, 0 best; null where the letters aren't in it in this order. Capitals don't count. */
export function rankOf(query: string, name: string): number | null {
  const asked = query.replace(/\s+/g, "").toLowerCase();
  const letters = name.toLowerCase();
  const compact = letters.replace(/\s+/g, "");
  if (asked === "") return 0;
  if (compact === asked) return 0;
  if (compact.startsWith(asked)) return 1;
  if (letters.split(/[-_ ]/).some((word) => word.startsWith(asked))) return 2;
  if (compact.includes(asked)) return 3;
  let from = 0;
  for (const letter of asked) {
    const at = compact.indexOf(letter, from);
    if (at < 0) return null;
    from = at + letter.length;
  }
  return 4;
}
