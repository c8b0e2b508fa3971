/** The grammar of a system's standing facts, a rule for each keyword. */
import type { IToken } from "chevrotain";
import { Phrases, wordOf } from "./phrases.ts";
import type { Fact, LimitKind, QuantityText, TankSize } from "./syntax.ts";
import { cross, keyword } from "./tokens.ts";

/** Gives numbers without a unit the next one written, else the last. Numbers of a pure kind keep none. */
function lend(quantities: readonly QuantityText[]): QuantityText[] {
  const lent = [...quantities];
  let lender: QuantityText | undefined = lent.findLast((quantity) => quantity.unit !== null);
  for (let index = lent.length - 1; index >= 0; index -= 1) {
    const own = lent[index]!;
    if (own.unit) lender = own;
    else if (lender)
      lent[index] = {
        ...own,
        unit: lender.unit,
        borrowedUnit: true,
        asCaCO3: own.asCaCO3 ?? lender.asCaCO3,
      };
  }
  return lent;
}

export abstract class SystemFacts extends Phrases {
  private readonly always = this.RULE("always", (): void => {
    this.part("always", this.CONSUME(keyword.always), this.SUBRULE(this.quantity));
  });

  private readonly times = this.RULE("times", (): void => {
    this.part("times", this.CONSUME(keyword.times), this.SUBRULE(this.number));
  });

  private readonly size = this.RULE(
    "size",
    (): TankSize =>
      this.OR<TankSize>([
        {
          ALT: () => {
            this.CONSUME(keyword.round);
            return this.SUBRULE(this.diameterAndDepth, { ARGS: ["round"] });
          },
        },
        {
          ALT: () => {
            this.CONSUME(keyword.cone);
            return this.SUBRULE2(this.diameterAndDepth, { ARGS: ["cone"] });
          },
        },
        {
          ALT: () => {
            const first = this.SUBRULE(this.quantity);
            const sides = this.OPTION(() => {
              this.CONSUME(cross);
              const width = this.SUBRULE2(this.quantity);
              this.CONSUME2(cross);
              const depth = this.SUBRULE3(this.quantity);
              return [width, depth];
            });
            return this.ACTION((): TankSize => {
              if (!sides) return { shape: "volume", volume: first };
              const [length, width, depth] = lend([first, ...sides]);
              return { shape: "box", length: length!, width: width!, depth: depth! };
            });
          },
        },
      ]),
  );

  private readonly diameterAndDepth = this.RULE("diameterAndDepth", (shape: "round" | "cone"): TankSize => {
    const across = this.SUBRULE(this.quantity);
    this.CONSUME(cross);
    const down = this.SUBRULE2(this.quantity);
    return this.ACTION((): TankSize => {
      const [diameter, depth] = lend([across, down]);
      return { shape, diameter: diameter!, depth: depth! };
    });
  });

  readonly tank = this.RULE("tank", (): Fact => {
    this.CONSUME(keyword.tank);
    const name = this.SUBRULE(this.name);
    const size = this.SUBRULE(this.size);
    this.MANY(() =>
      this.OR([{ ALT: () => this.SUBRULE(this.times) }, { ALT: () => this.SUBRULE(this.validity) }]),
    );
    return { kind: "tank", name, size, times: this.parts.times, ...this.standing };
  });

  readonly displace = this.RULE("displace", (): Fact => {
    this.CONSUME(keyword.displace);
    const name = this.SUBRULE(this.name);
    const amount = this.SUBRULE(this.quantity);
    this.MANY(() =>
      this.OR([
        { ALT: () => this.part("at", this.CONSUME(keyword.at), this.SUBRULE2(this.quantity)) },
        { ALT: () => this.SUBRULE(this.validity) },
      ]),
    );
    return { kind: "displace", name, amount, density: this.parts.at, ...this.standing };
  });

  readonly measured = this.fact("measured", () => {
    this.CONSUME(keyword.measured);
    this.CONSUME(keyword.volume);
    const volume = this.SUBRULE(this.quantity);
    return { kind: "measured", volume };
  });

  readonly hold = this.RULE("hold", (): Fact => {
    this.CONSUME(keyword.hold);
    const parameter = this.SUBRULE(this.parameter);
    const low = this.SUBRULE(this.quantity);
    this.CONSUME(keyword.to);
    const high = this.SUBRULE2(this.quantity);
    this.MANY(() =>
      this.OR([
        { ALT: () => this.part("aim", this.CONSUME(keyword.aim), this.SUBRULE3(this.quantity)) },
        { ALT: () => this.SUBRULE(this.validity) },
      ]),
    );
    return this.ACTION((): Fact => {
      const { aim } = this.parts;
      const lent = lend(aim ? [low, high, aim] : [low, high]);
      return {
        kind: "hold",
        parameter,
        low: lent[0]!,
        high: lent[1]!,
        aim: lent[2] ?? null,
        ...this.standing,
      };
    });
  });

  readonly limit = this.fact("limit", () => {
    this.CONSUME(keyword.limit);
    const parameter = this.SUBRULE(this.parameter);
    const which: IToken = this.OR([
      { ALT: () => this.CONSUME(keyword.rise) },
      { ALT: () => this.CONSUME(keyword.fall) },
      { ALT: () => this.CONSUME(keyword.swing) },
      { ALT: () => this.CONSUME(keyword.dose) },
      { ALT: () => this.CONSUME(keyword.max) },
      { ALT: () => this.CONSUME(keyword.min) },
    ]);
    const value = this.SUBRULE(this.quantity);
    return { kind: "limit", parameter, which: which.image as LimitKind, value };
  });

  readonly cohort = this.RULE("cohort", (): Fact => {
    this.CONSUME(keyword.cohort);
    const name = this.SUBRULE(this.name);
    const count = this.SUBRULE(this.count);
    this.CONSUME(keyword.uptake);
    const uptake = this.SUBRULE(this.quantity);
    this.MANY(() =>
      this.OR([
        {
          ALT: () => {
            const token = this.CONSUME(keyword.each);
            this.part("each", token, wordOf(token));
          },
        },
        { ALT: () => this.part("magnesium", this.CONSUME(keyword.magnesium), this.SUBRULE2(this.quantity)) },
        { ALT: () => this.part("grows", this.CONSUME(keyword.grows), this.SUBRULE3(this.quantity)) },
        { ALT: () => this.SUBRULE(this.validity) },
      ]),
    );
    const { each, magnesium, grows } = this.parts;
    return { kind: "cohort", name, count, uptake, each: each !== null, magnesium, grows, ...this.standing };
  });

  readonly uptake = this.fact("uptake", () => {
    this.CONSUME(keyword.uptake);
    const parameter = this.SUBRULE(this.parameter);
    const value = this.SUBRULE(this.quantity);
    return { kind: "uptake", parameter, value };
  });

  readonly skeleton = this.fact("skeleton", () => {
    this.CONSUME(keyword.skeleton);
    this.CONSUME(keyword.magnesium);
    const magnesium = this.SUBRULE(this.quantity);
    return { kind: "skeleton", magnesium };
  });

  readonly air = this.fact("air", () => {
    this.CONSUME(keyword.air);
    this.CONSUME(keyword.CO2);
    const carbonDioxide = this.SUBRULE(this.quantity);
    return { kind: "air", carbonDioxide };
  });

  readonly light = this.fact("light", () => {
    this.CONSUME(keyword.light);
    this.CONSUME(keyword.between);
    const hours = this.SUBRULE(this.hours);
    return { kind: "light", hours };
  });

  readonly evaporates = this.fact("evaporates", () => {
    this.CONSUME(keyword.evaporates);
    const volume = this.SUBRULE(this.quantity, { LABEL: "volume" });
    return { kind: "evaporates", volume };
  });

  readonly feeds = this.fact("feeds", () => {
    this.CONSUME(keyword.feeds);
    const food = this.SUBRULE(this.quantity);
    this.CONSUME(keyword.protein);
    const protein = this.SUBRULE2(this.quantity);
    return { kind: "feeds", food, protein };
  });

  readonly topOff = this.fact("topOff", () => {
    this.CONSUME(keyword["top-off"]);
    const solution = this.OPTION(() => this.SUBRULE(this.name, { LABEL: "SOLUTION" })) ?? null;
    const volume = this.SUBRULE(this.quantity, { LABEL: "volume" });
    return { kind: "top-off", solution, volume };
  });

  readonly flowsThrough = this.fact("flowsThrough", () => {
    this.CONSUME(keyword["flows-through"]);
    const volume = this.SUBRULE(this.quantity, { LABEL: "volume" });
    this.CONSUME(keyword.with);
    const water = this.SUBRULE(this.name, { LABEL: "WATER" });
    return { kind: "flows-through", volume, water };
  });

  readonly pump = this.RULE("pump", (): Fact => {
    this.CONSUME(keyword.pump);
    const name = this.SUBRULE(this.name);
    this.CONSUME(keyword.gives);
    const solution = this.SUBRULE2(this.name, { LABEL: "SOLUTION" });
    this.CONSUME(keyword.at);
    const flow = this.SUBRULE(this.quantity);
    this.MANY(() =>
      this.OR([
        { ALT: () => this.part("least", this.CONSUME(keyword.least), this.SUBRULE2(this.quantity)) },
        { ALT: () => this.part("between", this.CONSUME(keyword.between), this.SUBRULE(this.hours)) },
        { ALT: () => this.SUBRULE(this.always) },
        { ALT: () => this.part("holding", this.CONSUME(keyword.holding), this.SUBRULE3(this.quantity)) },
        { ALT: () => this.SUBRULE(this.validity) },
      ]),
    );
    const { least, between: hours, always, holding } = this.parts;
    return { kind: "pump", name, solution, flow, least, hours, always, holding, ...this.standing };
  });

  readonly byHand = this.RULE("byHand", (): Fact => {
    this.CONSUME(keyword["by-hand"]);
    const solution = this.SUBRULE(this.name, { LABEL: "SOLUTION" });
    this.MANY(() =>
      this.OR([
        { ALT: () => this.SUBRULE(this.times) },
        { ALT: () => this.SUBRULE(this.always) },
        { ALT: () => this.SUBRULE(this.validity) },
      ]),
    );
    const { times, always } = this.parts;
    return { kind: "by-hand", solution, times, always, ...this.standing };
  });
}
