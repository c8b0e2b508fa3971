/** How much water a system holds: shapes of tanks, what takes up room, a measured volume. */
import { describe, expect, it } from "vitest";
import { volumeAt } from "../../server/dosing/volume.ts";
import { farm, minute, systemIn } from "./fixture.ts";

function litres(facts: string, moment = "2026-12-01"): number | null {
  const indented = facts
    .trim()
    .split("\n")
    .map((line) => `  ${line.trim()}`);
  const bound = farm(["system vat", ...indented, ""].join("\n"));
  return volumeAt(systemIn(bound).facts, minute(moment)).litres;
}

describe("a tank", () => {
  it.each([
    // 240 × 90 × 32 cm = 691 200 cm³.
    ["tank raceway 240 cm x 90 cm x 32 cm", 691.2],
    ["tank raceway 240 cm x 90 cm x 32 cm times 2", 1382.4],
    ["tank raceway 2.4 m x 90 cm x 320 mm", 691.2],
    ["tank raceway 240 x 90 x 32 cm", 691.2],
    ["tank raceway 240 × 90 × 32 cm", 691.2],
    // π/4 × 1.2² × 0.6 m³ = 0.678584 m³.
    ["tank quarantine round 1.2 m x 60 cm", (Math.PI / 4) * 1.44 * 600],
    ["tank quarantine round 120 x 60 cm", (Math.PI / 4) * 1.44 * 600],
    // A third of the cylinder: π/12 × 8² × 9.5 dm³.
    ["tank settling cone 80 cm x 95 cm", (Math.PI / 12) * 64 * 9.5],
    ["tank sump 310 L", 310],
    ["tank sump 0.31 m3", 310],
    ["tank sump 82 gal", 82 * 3.785411784],
    // 8 × 3 × 1 ft; a foot is 3.048 dm.
    ["tank raceway 8 ft x 3 ft x 1 ft", 24 * 3.048 ** 3],
    ["tank raceway 48 inch x 24 inch x 12 inch", 48 * 24 * 12 * 0.254 ** 3],
  ])("%s", (line, expected) => {
    expect(litres(line)).toBeCloseTo(expected, 9);
  });

  it("adds to the others", () => {
    // 1382.4 + 159.174 + 310 − 64; the cone is π/12 × 64 × 9.5 = 159.174 L.
    const facts = `
      tank raceway 240 cm x 90 cm x 32 cm times 2
      tank settling cone 80 cm x 95 cm
      tank sump 310 L
      displace rock 64 L`;
    expect(litres(facts)).toBeCloseTo(1382.4 + (Math.PI / 12) * 64 * 9.5 + 310 - 64, 9);
  });

  it("is there a whole number of times", () => {
    farm(`
system vat
  tank main 500 L times 0
                        ^ syntax/number-form, word 0
  tank sump 100 L times 1.5
                        ^^^ syntax/number-form, word 1.5
`);
  });
});

describe("what takes up room", () => {
  it("is a volume, or a mass at its density", () => {
    expect(litres("tank main 500 L\ndisplace rock 64 L")).toBe(436);
    // 60 kg at 2.4 kg/L are 25 L.
    expect(litres("tank main 500 L\ndisplace rubble 60 kg at 2.4 kg/L")).toBeCloseTo(475, 12);
    expect(litres("tank main 500 L\ndisplace rubble 60 kg at 2.4 g/mL")).toBeCloseTo(475, 12);
    expect(litres("tank main 500 L\ndisplace rubble 100 lb at 2.5 kg/L")).toBeCloseTo(
      500 - 45.359237 / 2.5,
      12,
    );
  });

  it("is gone after `until`", () => {
    const facts = "tank main 500 L\ndisplace rubble 60 kg at 2.4 kg/L until 2026-11-01";
    expect(litres(facts, "2026-10-31 23:59")).toBeCloseTo(475, 12);
    expect(litres(facts, "2026-11-01 00:00")).toBe(500);
  });

  it("leaves no water where it is as much as the tanks", () => {
    expect(litres("tank main 500 L\ndisplace rock 500 L")).toBeNull();
    expect(litres("tank main 500 L\ndisplace rock 600 L")).toBeNull();
    expect(litres("hold salinity 34 to 36")).toBeNull();
  });

  it("has a density", () => {
    farm(`
system vat
  tank main 500 L
  displace rock 60 kg at 0 kg/L
                         ^ syntax/number-form, word 0
  displace sand 60 L at 2 kg/L
                   ^ unit/dimension
  displace racks -5 L
                 ^^ syntax/number-form, word -5, readings 5
`);
  });
});

describe("a measured volume", () => {
  it("wins over the tanks' measures from its day on", () => {
    const facts = "tank main 500 L\nmeasured volume 470 L ± 10 L from 2026-10-02";
    expect(litres(facts, "2026-10-01 23:59")).toBe(500);
    expect(litres(facts, "2026-10-02 00:00")).toBe(470);
  });

  it("is enough by itself", () => {
    expect(litres("measured volume 470 L")).toBe(470);
  });
});
