/**
 * The phrases that statements share: names, parameters, units, quantities, moments, hours, and the optional parts
 * that may stand in any order. The parser of the statements builds on this one.
 */
import { EmbeddedActionsParser, type IToken, type ParserMethod } from "chevrotain";
import { type BareDate, clockMinute, dayMinute, momentAt } from "./dates.ts";
import { nearestWords, parameterUnknown, unitWords } from "./nearest.ts";
import { plainNumber } from "./numbers.ts";
import type {
  ClockTime,
  Dated,
  Event,
  Fact,
  Hours,
  LineFinding,
  Moment,
  NumberWord,
  QuantityText,
  Span,
  Standing,
  StockCount,
  UnitWord,
  Word,
} from "./syntax.ts";
import {
  asCaCO3,
  dateWord,
  keyword,
  nameWord,
  numberWord,
  plusMinus,
  quoted,
  spanOf,
  stroke,
  timeWord,
  unitWord,
  vocabulary,
} from "./tokens.ts";
import { readUnit } from "./units.ts";

/** What a line may say besides its fixed words, each once, by the keyword that starts it. */
export interface Parts {
  title: Word | null;
  from: Moment | null;
  until: Moment | null;
  by: Word | null;
  times: NumberWord | null;
  at: QuantityText | null;
  aim: QuantityText | null;
  each: Word | null;
  magnesium: QuantityText | null;
  grows: QuantityText | null;
  least: QuantityText | null;
  between: Hours | null;
  always: QuantityText | null;
  holding: QuantityText | null;
  as: Word | null;
  purity: QuantityText | null;
  lot: Word | null;
  with: Word | null;
  disregard: Word | null;
}

const noParts: Readonly<Parts> = {
  ...{ title: null, from: null, until: null, by: null, times: null, at: null, aim: null, each: null },
  ...{ magnesium: null, grows: null, least: null, between: null, always: null, holding: null, as: null },
  ...{ purity: null, lot: null, with: null, disregard: null },
};

/** A statement's own part, without what all of its form may say. */
type Without<Whole, Common> = Whole extends Common ? Omit<Whole, keyof Common> : never;

type AfterUnit = Pick<QuantityText, "asCaCO3" | "uncertainty">;

/** A unit as the parser met it: how it stands in the line, and whether the table knows it. */
export interface UnitMet {
  readonly first: IToken;
  readonly last: IToken;
  readonly text: string;
  readonly known: boolean;
}

export const wordOf = (token: IToken): Word => ({ text: token.image, ...spanOf(token) });
const endOf = (token: IToken): number => token.startOffset + token.image.length;

function quantityText(number: NumberWord, unit: UnitWord | null, rest: AfterUnit): QuantityText {
  const end = Math.max(number.end, unit?.end ?? 0, rest.asCaCO3?.end ?? 0, rest.uncertainty?.end ?? 0);
  return { start: number.start, end, number, unit, borrowedUnit: false, ...rest };
}

export abstract class Phrases extends EmbeddedActionsParser {
  /** What the line got wrong though it could be read on. */
  findings: LineFinding[] = [];
  parts: Parts = { ...noParts };
  lastUnit: UnitMet | null = null;
  /** When the event was that is being read; its date stands before the words that a rule reads. */
  at: Moment = { start: 0, end: 0, minute: 0, timeKnown: false };

  constructor(settings: { readonly skipValidations: boolean }) {
    super([...vocabulary], { maxLookahead: 1, recoveryEnabled: false, ...settings });
  }

  /** Sets out to read these words. */
  begin(tokens: IToken[]): void {
    this.input = tokens;
    this.findings = [];
    this.parts = { ...noParts };
    this.lastUnit = null;
  }

  /** Notes an optional part, and that it was said before if it was. */
  protected part<Key extends keyof Parts>(key: Key, token: IToken, value: Parts[Key]): void {
    if (this.parts[key] === null) this.parts[key] = value;
    else this.repeated(token);
  }

  private repeated(token: IToken): void {
    this.findings.push({
      code: "syntax/misplaced",
      span: spanOf(token),
      word: token.image,
      belongs: [],
      why: "repeated",
    });
  }

  protected get standing(): Standing {
    return { from: this.parts.from, until: this.parts.until };
  }

  protected get dated(): Dated {
    return { at: this.at, by: this.parts.by };
  }

  readonly name = this.RULE("name", (): Word => wordOf(this.CONSUME(nameWord)));

  readonly parameter = this.RULE("parameter", (): Word => {
    const token = this.CONSUME(nameWord);
    this.ACTION(() => {
      const finding = parameterUnknown(token);
      if (finding) this.findings.push(finding);
    });
    return wordOf(token);
  });

  /** Its span takes the quotes in, its text doesn't. */
  readonly text = this.RULE("text", (): Word => {
    const token = this.CONSUME(quoted);
    return { text: token.image.slice(1, -1), ...spanOf(token) };
  });

  readonly number = this.RULE("number", (): NumberWord => {
    const token = this.CONSUME(numberWord);
    return { text: plainNumber(token.image) ?? "", ...spanOf(token) };
  });

  readonly unit = this.RULE("unit", (): UnitWord => {
    let text = "";
    const first = this.OR([
      {
        ALT: () => {
          const word = this.CONSUME(unitWord);
          text = word.image;
          return word;
        },
      },
      {
        // A bare rate, for what has no unit of its own: `0.3 /day`.
        ALT: () => {
          const over = this.CONSUME(stroke);
          text = `/${this.CONSUME2(unitWord).image}`;
          return over;
        },
      },
    ]);
    this.MANY(() => {
      this.CONSUME2(stroke);
      text += `/${this.CONSUME3(unitWord).image}`;
    });
    return this.ACTION(() => {
      const last = this.LA(0);
      const reading = readUnit(text);
      this.lastUnit = { first, last, text, known: reading.known };
      const spelling = reading.known ? reading.unit.spelling : text;
      return { text: spelling, start: first.startOffset, end: endOf(last) };
    });
  });

  readonly afterUnit = this.RULE("afterUnit", (): AfterUnit => {
    let calcite: Span | null = null;
    const note = (token: IToken) => {
      if (calcite) this.repeated(token);
      calcite ??= spanOf(token);
    };
    this.OPTION(() => note(this.CONSUME(asCaCO3)));
    const uncertainty = this.OPTION2(() => {
      const sign = this.CONSUME(plusMinus);
      const number = this.SUBRULE(this.number);
      const unit = this.OPTION3(() => this.SUBRULE(this.unit)) ?? null;
      this.OPTION4(() => note(this.CONSUME2(asCaCO3)));
      return this.ACTION(() => ({ start: sign.startOffset, end: unit?.end ?? number.end, number, unit }));
    });
    return { asCaCO3: calcite, uncertainty: uncertainty ?? null };
  });

  readonly quantity = this.RULE("quantity", (): QuantityText => {
    const number = this.SUBRULE(this.number);
    const unit = this.OPTION(() => this.SUBRULE(this.unit)) ?? null;
    const rest = this.SUBRULE(this.afterUnit);
    return this.ACTION(() => quantityText(number, unit, rest));
  });

  /** Where `pieces` could have stood, a unit that is none is the line's own slip. */
  private needKnownUnit({ start, end, text: word }: UnitWord): void {
    if (this.lastUnit?.known) return;
    const nearest = nearestWords(word, ["pieces", ...unitWords]);
    const expected = ["pieces", "a unit"];
    this.findings.push({ code: "syntax/unknown-word", span: { start, end }, word, expected, nearest });
  }

  readonly count = this.RULE("count", (): StockCount => {
    const number = this.SUBRULE(this.number);
    return this.OR<StockCount>([
      {
        ALT: () => {
          this.CONSUME(keyword.pieces);
          return { by: "pieces", number };
        },
      },
      {
        ALT: () => {
          const unit = this.SUBRULE(this.unit);
          this.ACTION(() => this.needKnownUnit(unit));
          const rest = this.SUBRULE(this.afterUnit);
          return this.ACTION(() => ({ by: "area", area: quantityText(number, unit, rest) }));
        },
      },
    ]);
  });

  readonly moment = this.RULE("moment", (bareDate: BareDate): Moment => {
    const date = this.CONSUME(dateWord);
    const time = this.OPTION(() => this.CONSUME(timeWord));
    return this.ACTION(() => momentOf(date, time, bareDate));
  });

  readonly clock = this.RULE("clock", (): ClockTime => {
    const token = this.CONSUME(timeWord);
    return { minute: clockMinute(token.image) ?? 0, ...spanOf(token) };
  });

  readonly hours = this.RULE("hours", (): Hours => {
    const from = this.SUBRULE(this.clock);
    this.CONSUME(keyword.and);
    const to = this.SUBRULE2(this.clock);
    return { from, to };
  });

  /** `from DATE`, `until DATE`. */
  readonly validity = this.RULE("validity", (): void => {
    this.OR([
      { ALT: () => this.sinceWhen() },
      {
        ALT: () =>
          this.part("until", this.CONSUME(keyword.until), this.SUBRULE2(this.moment, { ARGS: ["midnight"] })),
      },
    ]);
  });

  protected sinceWhen(): void {
    this.part("from", this.CONSUME(keyword.from), this.SUBRULE(this.moment, { ARGS: ["midnight"] }));
  }

  private readonly validities = this.RULE("validities", (): void => {
    this.MANY(() => this.SUBRULE(this.validity));
  });

  /** `by WHO`. */
  readonly signature = this.RULE("signature", (): void => {
    this.part("by", this.CONSUME(keyword.by), this.SUBRULE(this.name, { LABEL: "WHO" }));
  });

  private readonly signatures = this.RULE("signatures", (): void => {
    this.MANY(() => this.SUBRULE(this.signature));
  });

  /** The rule of a fact that has no optional part but `from` and `until`. */
  protected fact(rule: string, read: () => Without<Fact, Standing>): ParserMethod<[], Fact> {
    return this.RULE(rule, (): Fact => {
      const said = read();
      this.SUBRULE(this.validities);
      return { ...said, ...this.standing };
    });
  }

  /** The rule of an event that has no optional part but `by`. */
  protected event(rule: string, read: () => Without<Event, Dated>): ParserMethod<[], Event> {
    return this.RULE(rule, (): Event => {
      const said = read();
      this.SUBRULE(this.signatures);
      return { ...said, ...this.dated };
    });
  }
}

/** The moment of a date word and a time word that have been checked. */
export function momentOf(date: IToken, time: IToken | undefined, bareDate: BareDate): Moment {
  const clock = time ? clockMinute(time.image) : null;
  const end = endOf(time ?? date);
  return { start: date.startOffset, end, ...momentAt(dayMinute(date.image) ?? 0, clock, bareDate) };
}
