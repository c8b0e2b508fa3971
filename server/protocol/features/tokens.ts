/** Semantic tokens: of a whole document, what changed of them, of a part. */
import type { SemanticTokens, SemanticTokensDelta } from "vscode-languageserver/node";
import { numbersEdits, type Token, tokenModifiers, tokens, tokenTypes } from "../../editor/tokens.ts";
import type { Convert } from "../convert.ts";
import { about, type Feature } from "../session.ts";
import { inTurns } from "../turns.ts";
import type { LookAt } from "../workspace.ts";

/** The answers of so many documents are kept, to tell only what changed. */
const mostKept = 32;
const tokensAtOnce = 512;

/** As the protocol has them: five numbers each, places counted from the token before. */
function* numbersOf(
  convert: Convert,
  { farm, file }: LookAt,
  found: readonly Token[],
): Generator<void, number[]> {
  const data: number[] = [];
  let lineBefore = 0;
  let before = 0;
  for (const [index, { line, start, end, type, modifiers }] of found.entries()) {
    if (index % tokensAtOnce === 0) yield;
    const first = convert.position(farm, file, line, start).character;
    const length = convert.position(farm, file, line, end).character - first;
    if (line !== lineBefore) before = 0;
    const bits = modifiers.reduce((sum, modifier) => sum + 2 ** tokenModifiers.indexOf(modifier), 0);
    data.push(line - lineBefore, first - before, length, tokenTypes.indexOf(type), bits);
    lineBefore = line;
    before = first;
  }
  return data;
}

function* allTokens(convert: Convert, look: LookAt, first: number, last: number): Generator<void, number[]> {
  const found = yield* tokens(look.farm, look.file, first, last);
  return yield* numbersOf(convert, look, found);
}

export const tokensFeature: Feature = {
  title: "Semantic tokens",
  about: "what each word is, for colouring: whole documents, changes, ranges",
  offers: () => ({
    semanticTokensProvider: {
      legend: { tokenTypes: [...tokenTypes], tokenModifiers: [...tokenModifiers] },
      full: { delta: true },
      range: true,
    },
  }),
  listen: (session) => {
    const { connection, convert } = session;
    const kept = new Map<string, { readonly id: string; readonly data: readonly number[] }>();
    let lastId = 0;
    const keep = (uri: string, data: readonly number[]): string => {
      lastId += 1;
      const id = String(lastId);
      kept.delete(uri);
      kept.set(uri, { id, data });
      const [oldest] = kept.keys();
      if (kept.size > mostKept && oldest !== undefined) kept.delete(oldest);
      return id;
    };
    const { semanticTokens } = connection.languages;
    const none: SemanticTokens = { data: [] };
    const whole = (look: LookAt) => allTokens(convert, look, 0, Number.POSITIVE_INFINITY);

    semanticTokens.on(async ({ textDocument: { uri } }, token): Promise<SemanticTokens> => {
      const data = await about(session, uri, token, (look) => inTurns(whole(look), token));
      return data ? { resultId: keep(uri, data), data } : none;
    });
    semanticTokens.onDelta(
      async (
        { textDocument: { uri }, previousResultId },
        token,
      ): Promise<SemanticTokens | SemanticTokensDelta> => {
        const data = await about(session, uri, token, (look) => inTurns(whole(look), token));
        if (!data) return none;
        const before = kept.get(uri);
        const resultId = keep(uri, data);
        if (before?.id !== previousResultId) return { resultId, data };
        const edits = numbersEdits(before.data, data).map((edit) => ({ ...edit, data: [...edit.data] }));
        return { resultId, edits };
      },
    );
    semanticTokens.onRange(async ({ textDocument: { uri }, range }, token): Promise<SemanticTokens> => {
      const { start, end } = range;
      // A range that ends before a line's first character leaves the line out.
      const last = end.character === 0 && end.line > start.line ? end.line - 1 : end.line;
      const data = await about(session, uri, token, (look) =>
        inTurns(allTokens(convert, look, start.line, last), token),
      );
      return data ? { data } : none;
    });
  },
};
