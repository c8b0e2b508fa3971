/** The water around an event is the same whether the log was folded before or is folded now. */
import { expect, test } from "vitest";
import { writeMoment } from "../../grammar/dates.ts";
import type { KeptAssessment } from "../../server/dosing/assess.ts";
import { afterMinute, atEvent } from "../../server/dosing/at-event.ts";
import { advance } from "../../server/farm.ts";

const start = Date.UTC(2026, 8, 1) / 60_000;

/** 200 events, six hours apart: far more than stand between two states that are kept. */
const lines = Array.from({ length: 200 }, (_, index) => {
  const moment = writeMoment(start + index * 360).replace("T", " ");
  const said = [
    `read alkalinity ${7 + (index % 9) / 10} dKH`,
    `gave soda ${10 + (index % 5)} mL`,
    "renewed 20 L with sea",
  ];
  return `  ${moment} ${said[index % 3]}`;
});

const farm = advance(
  null,
  new Map([
    [
      "farm.marl",
      {
        text: `system vat\n  tank main 500 L\n  cohort plugs 90 pieces uptake 2 meq/day each grows 1 %/week\nlog vat\n${lines.join("\n")}\nsolution soda\n  supplies alkalinity 1 meq/mL\nsaltwater sea\n  salinity 35\n`,
      },
    ],
  ]),
  { at: start + 60 * 1440, clock: start + 60 * 1440 },
);
const { constants, system } = farm.assessments.get("vat")!;
const { log } = farm.kept.get("assessment vat")!.result as KeptAssessment;

test("around each event", () => {
  expect(log.checkpoints.length).toBeGreaterThan(2);
  for (const event of system.events) {
    const kept = atEvent({ constants, events: system.events, folded: log }, event);
    expect(kept).toEqual(atEvent({ constants, events: system.events, folded: null }, event));
    expect(kept?.before.minute).toBe(event.minute);
  }
});

test("after a minute", () => {
  const minute = system.events[150]!.minute + 77;
  const kept = afterMinute({ constants, events: system.events, folded: log }, minute);
  expect(kept).toEqual(afterMinute({ constants, events: system.events, folded: null }, minute));
  expect(kept.minute).toBe(minute);
});

test("an event that isn't in the log has no water around it", () => {
  const [first] = system.events;
  expect(atEvent({ constants, events: system.events.slice(1), folded: null }, first!)).toBeNull();
});
