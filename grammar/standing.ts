/** The grammar of headers and of the standing facts of every section but a system's, a rule for each keyword. */
import type { IToken } from "chevrotain";
import { wordOf } from "./phrases.ts";
import type { Fact, Header, KitFact, SectionKind, Use, Word } from "./syntax.ts";
import { SystemFacts } from "./system-facts.ts";
import { formulaWord, keyword } from "./tokens.ts";

const formulaText = (image: string): string =>
  image
    .replace(/[\s\u180e\u200b\u2060\ufeff]+/g, "")
    .replace(/[.•⋅∙*]/g, "·")
    .replace(/[\u2080-\u2089]/g, (digit) => String(digit.charCodeAt(0) - 0x2080));

export abstract class Standing extends SystemFacts {
  private heading(section: SectionKind, name: Word | null): Header {
    return { kind: "header", section, name, title: this.parts.title, from: this.parts.from };
  }

  readonly title = this.RULE("title", (): void => {
    const text = this.SUBRULE(this.text);
    this.ACTION(() => this.part("title", this.LA(0), text));
  });

  private readonly namedHeader = (section: SectionKind) =>
    this.RULE(section, (): Header => {
      this.CONSUME(keyword[section]);
      const name = this.SUBRULE(this.name);
      this.MANY(() => this.SUBRULE(this.title));
      return this.heading(section, name);
    });

  readonly system = this.namedHeader("system");
  readonly reagent = this.namedHeader("reagent");
  readonly saltwater = this.namedHeader("saltwater");
  readonly kit = this.namedHeader("kit");

  readonly solution = this.RULE("solution", (): Header => {
    this.CONSUME(keyword.solution);
    const name = this.SUBRULE(this.name);
    this.MANY(() => this.OR([{ ALT: () => this.SUBRULE(this.title) }, { ALT: () => this.sinceWhen() }]));
    return this.heading("solution", name);
  });

  readonly log = this.RULE("log", (): Header => {
    this.CONSUME(keyword.log);
    const name = this.SUBRULE(this.name);
    return this.heading("log", name);
  });

  readonly store = this.RULE("store", (): Header => {
    this.CONSUME(keyword.store);
    return this.heading("store", null);
  });

  readonly use = this.RULE("use", (): Use => {
    this.CONSUME(keyword.use);
    return { kind: "use", path: this.SUBRULE(this.text) };
  });

  readonly dissolve = this.fact("dissolve", () => {
    this.CONSUME(keyword.dissolve);
    const reagent = this.SUBRULE(this.name, { LABEL: "REAGENT" });
    const mass = this.SUBRULE(this.quantity, { LABEL: "mass" });
    return { kind: "dissolve", reagent, mass };
  });

  readonly saturated = this.fact("saturated", () => {
    this.CONSUME(keyword.saturated);
    const reagent = this.SUBRULE(this.name, { LABEL: "REAGENT" });
    return { kind: "saturated", reagent };
  });

  readonly makeUp = this.fact("makeUp", () => {
    this.CONSUME(keyword.make);
    this.CONSUME(keyword.up);
    this.CONSUME(keyword.to);
    const volume = this.SUBRULE(this.quantity, { LABEL: "volume" });
    return { kind: "make-up", volume };
  });

  readonly keep = this.fact("keep", () => {
    this.CONSUME(keyword.keep);
    this.CONSUME(keyword.at);
    const temperature = this.SUBRULE(this.quantity, { LABEL: "temperature" });
    return { kind: "keep", temperature };
  });

  readonly supplies = this.RULE("supplies", (): Fact => {
    this.CONSUME(keyword.supplies);
    const parameter = this.SUBRULE(this.parameter);
    const strength = this.SUBRULE(this.quantity);
    this.MANY(() =>
      this.OR([
        {
          ALT: () => {
            const token = this.CONSUME(keyword.as);
            const form: IToken = this.OR2([
              { ALT: () => this.CONSUME(keyword.carbonate) },
              { ALT: () => this.CONSUME(keyword.bicarbonate) },
              { ALT: () => this.CONSUME(keyword.hydroxide) },
            ]);
            this.ACTION(() => this.part("as", token, wordOf(form)));
          },
        },
        { ALT: () => this.SUBRULE(this.validity) },
      ]),
    );
    const as = (this.parts.as?.text ?? null) as "carbonate" | "bicarbonate" | "hydroxide" | null;
    return { kind: "supplies", parameter, strength, as, ...this.standing };
  });

  readonly acknowledge = this.fact("acknowledge", () => {
    this.CONSUME(keyword.acknowledge);
    this.CONSUME(keyword.caustic);
    const who = this.SUBRULE(this.text);
    return { kind: "acknowledge", who };
  });

  private readonly purity = this.RULE("purity", (): void => {
    this.MANY(() =>
      this.OR([
        { ALT: () => this.part("purity", this.CONSUME(keyword.purity), this.SUBRULE(this.quantity)) },
        { ALT: () => this.SUBRULE(this.validity) },
      ]),
    );
  });

  readonly is = this.RULE("is", (): Fact => {
    this.CONSUME(keyword.is);
    const reagent = this.SUBRULE(this.name, { LABEL: "REAGENT" });
    this.SUBRULE(this.purity);
    return { kind: "is", reagent, purity: this.parts.purity, ...this.standing };
  });

  readonly formula = this.RULE("formula", (): Fact => {
    this.CONSUME(keyword.formula);
    const token = this.CONSUME(formulaWord);
    this.SUBRULE(this.purity);
    const formula = { ...wordOf(token), text: formulaText(token.image) };
    return { kind: "formula", formula, purity: this.parts.purity, ...this.standing };
  });

  readonly reorderBelow = this.fact("reorderBelow", () => {
    this.CONSUME(keyword["reorder-below"]);
    const mass = this.SUBRULE(this.quantity, { LABEL: "mass" });
    return { kind: "reorder-below", mass };
  });

  readonly lead = this.fact("lead", () => {
    this.CONSUME(keyword.lead);
    const time = this.SUBRULE(this.quantity);
    return { kind: "lead", time };
  });

  readonly waterValue = this.fact("waterValue", () => {
    const parameter = this.SUBRULE(this.parameter);
    const value = this.SUBRULE(this.quantity);
    return { kind: "value", parameter, value };
  });

  readonly kitAccuracy = this.fact("kitAccuracy", () => {
    const parameter = this.SUBRULE(this.parameter);
    const which: IToken = this.OR([
      { ALT: () => this.CONSUME(keyword.scatter) },
      { ALT: () => this.CONSUME(keyword.tolerance) },
    ]);
    const value = this.SUBRULE(this.quantity);
    return { kind: which.image as KitFact["kind"], parameter, value };
  });

  readonly standingNote = this.fact("standingNote", () => {
    this.CONSUME(keyword.note);
    const text = this.SUBRULE(this.text);
    return { kind: "note", text };
  });
}
