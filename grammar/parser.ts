/** The grammar of events, and the one parser: a rule for each keyword, called by `line.ts` through the table. */
import { Standing } from "./standing.ts";
import type { Event, NamedQuantity, ReadItem } from "./syntax.ts";
import { comma, keyword } from "./tokens.ts";

export class MarlParser extends Standing {
  constructor(settings: { readonly skipValidations: boolean }) {
    super(settings);
    this.performSelfAnalysis();
  }

  private readonly readItem = this.RULE("readItem", (): ReadItem => {
    const parameter = this.SUBRULE(this.parameter);
    const below = this.OPTION(() => this.CONSUME(keyword.below)) !== undefined;
    const value = this.SUBRULE(this.quantity);
    return this.ACTION(() => ({ parameter, below, value, start: parameter.start, end: value.end }));
  });

  readonly read = this.RULE("read", (): Event => {
    this.CONSUME(keyword.read);
    const items: ReadItem[] = [];
    this.AT_LEAST_ONE_SEP({ SEP: comma, DEF: () => items.push(this.SUBRULE(this.readItem)) });
    this.MANY(() =>
      this.OR([
        {
          ALT: () => this.part("with", this.CONSUME(keyword.with), this.SUBRULE(this.name, { LABEL: "KIT" })),
        },
        { ALT: () => this.part("disregard", this.CONSUME(keyword.disregard), this.SUBRULE(this.text)) },
        { ALT: () => this.SUBRULE(this.signature) },
      ]),
    );
    const { with: kit, disregard } = this.parts;
    return { kind: "read", items, kit, disregard, ...this.dated };
  });

  private readonly namedQuantity = this.RULE("namedQuantity", (): NamedQuantity => {
    const name = this.SUBRULE(this.name);
    const quantity = this.SUBRULE(this.quantity);
    return this.ACTION(() => ({ name, quantity, start: name.start, end: quantity.end }));
  });

  private readonly namedQuantities = this.RULE("namedQuantities", (): NamedQuantity[] => {
    const items: NamedQuantity[] = [];
    this.AT_LEAST_ONE_SEP({ SEP: comma, DEF: () => items.push(this.SUBRULE(this.namedQuantity)) });
    return items;
  });

  readonly set = this.event("set", () => {
    this.CONSUME(keyword.set);
    const items = this.SUBRULE(this.namedQuantities);
    return { kind: "set", items };
  });

  readonly gave = this.event("gave", () => {
    this.CONSUME(keyword.gave);
    const items = this.SUBRULE(this.namedQuantities);
    return { kind: "gave", items };
  });

  readonly renewed = this.event("renewed", () => {
    this.CONSUME(keyword.renewed);
    const volume = this.SUBRULE(this.quantity, { LABEL: "volume" });
    this.CONSUME(keyword.with);
    const water = this.SUBRULE(this.name, { LABEL: "WATER" });
    return { kind: "renewed", volume, water };
  });

  readonly topped = this.RULE("topped", (): Event => {
    this.CONSUME(keyword.topped);
    const volume = this.SUBRULE(this.quantity, { LABEL: "volume" });
    this.MANY(() =>
      this.OR([
        {
          ALT: () =>
            this.part("with", this.CONSUME(keyword.with), this.SUBRULE(this.name, { LABEL: "SOLUTION" })),
        },
        { ALT: () => this.SUBRULE(this.signature) },
      ]),
    );
    return { kind: "topped", volume, solution: this.parts.with, ...this.dated };
  });

  private readonly stockChange = (kind: "stocked" | "removed") =>
    this.event(kind, () => {
      this.CONSUME(keyword[kind]);
      const cohort = this.SUBRULE(this.name, { LABEL: "COHORT" });
      const count = this.SUBRULE(this.count);
      return { kind, cohort, count };
    });

  readonly stocked = this.stockChange("stocked");
  readonly removed = this.stockChange("removed");

  readonly moved = this.event("moved", () => {
    this.CONSUME(keyword.moved);
    const cohort = this.SUBRULE(this.name, { LABEL: "COHORT" });
    const count = this.SUBRULE(this.count);
    this.CONSUME(keyword.to);
    const system = this.SUBRULE2(this.name, { LABEL: "SYSTEM" });
    return { kind: "moved", cohort, count, system };
  });

  readonly filled = this.event("filled", () => {
    this.CONSUME(keyword.filled);
    const pump = this.SUBRULE(this.name, { LABEL: "PUMP" });
    this.CONSUME(keyword.to);
    const volume = this.SUBRULE(this.quantity, { LABEL: "volume" });
    return { kind: "filled", pump, volume };
  });

  readonly level = this.event("level", () => {
    this.CONSUME(keyword.level);
    const pump = this.SUBRULE(this.name, { LABEL: "PUMP" });
    const volume = this.SUBRULE(this.quantity, { LABEL: "volume" });
    return { kind: "level", pump, volume };
  });

  readonly calibrated = this.event("calibrated", () => {
    this.CONSUME(keyword.calibrated);
    const pump = this.SUBRULE(this.name, { LABEL: "PUMP" });
    const volume = this.SUBRULE(this.quantity, { LABEL: "volume" });
    this.CONSUME(keyword.in);
    const time = this.SUBRULE2(this.quantity);
    return { kind: "calibrated", pump, volume, time };
  });

  private readonly pumpSwitch = (kind: "stopped" | "started") =>
    this.event(kind, () => {
      this.CONSUME(keyword[kind]);
      const pump = this.SUBRULE(this.name, { LABEL: "PUMP" });
      return { kind, pump };
    });

  readonly stopped = this.pumpSwitch("stopped");
  readonly started = this.pumpSwitch("started");

  readonly datedNote = this.event("datedNote", () => {
    this.CONSUME(keyword.note);
    const text = this.SUBRULE(this.text);
    return { kind: "note", text };
  });

  private readonly lots = this.RULE("lots", (): void => {
    this.MANY(() =>
      this.OR([
        { ALT: () => this.part("lot", this.CONSUME(keyword.lot), this.SUBRULE(this.text)) },
        { ALT: () => this.SUBRULE(this.signature) },
      ]),
    );
  });

  readonly received = this.RULE("received", (): Event => {
    this.CONSUME(keyword.received);
    const reagent = this.SUBRULE(this.name, { LABEL: "REAGENT" });
    const mass = this.SUBRULE(this.quantity, { LABEL: "mass" });
    this.SUBRULE(this.lots);
    return { kind: "received", reagent, mass, lot: this.parts.lot, ...this.dated };
  });

  readonly counted = this.event("counted", () => {
    this.CONSUME(keyword.counted);
    const reagent = this.SUBRULE(this.name, { LABEL: "REAGENT" });
    const mass = this.SUBRULE(this.quantity, { LABEL: "mass" });
    return { kind: "counted", reagent, mass };
  });

  private readonly batch = (kind: "mixed" | "discarded") =>
    this.event(kind, () => {
      this.CONSUME(keyword[kind]);
      const solution = this.SUBRULE(this.name, { LABEL: "SOLUTION" });
      const volume = this.SUBRULE(this.quantity, { LABEL: "volume" });
      return { kind, solution, volume };
    });

  readonly mixed = this.batch("mixed");
  readonly discarded = this.batch("discarded");

  readonly checked = this.RULE("checked", (): Event => {
    this.CONSUME(keyword.checked);
    const parameter = this.SUBRULE(this.parameter);
    const value = this.SUBRULE(this.quantity);
    this.CONSUME(keyword.against);
    const against = this.SUBRULE2(this.quantity);
    this.SUBRULE(this.lots);
    return { kind: "checked", parameter, value, against, lot: this.parts.lot, ...this.dated };
  });
}
