/** A truth and a seed → what the technicians wrote down, and how the water really was. */
import type { LogEvent, ReadParameter } from "./events.ts";
import { calcificationMeqPerDay, carried, dosed, type Running, renewed } from "./mass-balance.ts";
import { type Chance, chanceFrom } from "./random.ts";
import {
  alkalinitySetting,
  calciumSetting,
  magnesiumDose,
  pHAt,
  shown,
  type Tested,
  truly,
  wantsSetting,
} from "./technician.ts";
import type { Happening, Test, Truth, Water } from "./truth.ts";

/** The truth at a moment, hour by hour. */
export interface TrueMoment {
  readonly minute: number;
  readonly water: Water;
  /** By all cohorts together, mean of day and night. */
  readonly calcificationMeqPerDay: number;
}

export interface Simulation {
  readonly events: readonly LogEvent[];
  readonly course: readonly TrueMoment[];
}

const minutesPerDay = 24 * 60;
const minutesPerHour = 60;

/** Minutes since 1970-01-01 of a day at a time. */
export function minuteOf(truth: Truth, day: number, time: string): number {
  const [hour = "0", minute = "0"] = time.split(":");
  const midnight = Date.parse(`${truth.firstDay}T00:00:00Z`) / 60_000;
  return midnight + day * minutesPerDay + Number(hour) * minutesPerHour + Number(minute);
}

/** Simulates the days of a truth. Same truth and seed, same events. */
export function simulate(truth: Truth, seed: number): Simulation {
  const run = startOf(truth, chanceFrom(seed));
  for (let day = 0; day <= truth.days; day++) {
    const doings = [
      ...visits(run, day),
      ...truth.happenings
        .filter((happening) => happening.day === day)
        .map((happening) => ({ at: happening.time, act: () => happen(run, happening) })),
    ].sort((left, right) => (left.at < right.at ? -1 : left.at > right.at ? 1 : 0));
    for (const { at, act } of doings) {
      goTo(run, minuteOf(truth, day, at));
      act();
    }
    if (day < truth.days) goTo(run, minuteOf(truth, day + 1, "00:00"));
  }
  goTo(run, minuteOf(truth, truth.days, "08:00"));
  return { events: run.events, course: run.course };
}

/** All that changes while a truth runs. */
interface Run {
  readonly truth: Truth;
  readonly chance: Chance;
  readonly events: LogEvent[];
  readonly course: TrueMoment[];
  minute: number;
  water: Water;
  evaporatedLPerDay: number;
  readonly stock: Map<string, number>;
  readonly setMlPerDay: Map<string, number>;
  readonly stopped: Set<string>;
  /** Tests since the pumps were last set. */
  tests: Tested[];
  readonly calciumTests: number[];
  lastMagnesiumMgPerL: number | null;
}

function startOf(truth: Truth, chance: Chance): Run {
  return {
    truth,
    chance,
    events: [],
    course: [],
    minute: minuteOf(truth, 0, "07:00"),
    water: truth.start,
    evaporatedLPerDay: truth.evaporation.litresPerDay,
    stock: new Map(truth.cohorts.map(({ name, amount }) => [name, amount])),
    setMlPerDay: new Map(truth.pumps.map(({ name }) => [name, 0])),
    stopped: new Set(),
    tests: [],
    calciumTests: [],
    lastMagnesiumMgPerL: null,
  };
}

/** Carries the water to a minute, hour by hour, and keeps the truth of every full hour. */
function goTo(run: Run, minute: number): void {
  const { truth, chance } = run;
  while (run.minute < minute) {
    const nextHour = (Math.floor(run.minute / minutesPerHour) + 1) * minutesPerHour;
    const to = Math.min(nextHour, minute);
    const running = runningNow(run);
    run.water = carried(run.water, truth, running, (to - run.minute) / minutesPerDay);
    run.minute = to;
    if (to !== nextHour) continue;
    run.water = restless(run.water, truth, chance);
    run.course.push({
      minute: to,
      water: run.water,
      calcificationMeqPerDay: calcificationMeqPerDay(truth, running),
    });
    if (to % minutesPerDay === 0) {
      const { litresPerDay, dayToDay } = truth.evaporation;
      run.evaporatedLPerDay = Math.max(0, litresPerDay * (1 + dayToDay * chance.normal()));
    }
  }
}

function runningNow({ truth, minute, stock, setMlPerDay, stopped, evaporatedLPerDay }: Run): Running {
  const hour = Math.floor((minute % minutesPerDay) / minutesPerHour);
  return {
    stock,
    daysSinceStart: (minute - minuteOf(truth, 0, "07:00")) / minutesPerDay,
    isLight: hour >= truth.light.fromHour && hour < truth.light.toHour,
    pumped: truth.pumps
      .filter(({ name }) => !stopped.has(name))
      .map(({ name, solution, delivers }) => ({
        solution,
        mlPerDay: (setMlPerDay.get(name) ?? 0) * delivers,
      })),
    evaporatedLPerDay,
  };
}

/** An hour's share of what nobody can explain. */
function restless(water: Water, { unexplained }: Truth, chance: Chance): Water {
  const share = Math.sqrt(1 / 24);
  const moved = (name: keyof typeof unexplained) => water[name] + unexplained[name] * share * chance.normal();
  return {
    ...water,
    alkalinityMeqPerL: moved("alkalinityMeqPerL"),
    calciumMmolPerL: moved("calciumMmolPerL"),
    magnesiumMmolPerL: moved("magnesiumMmolPerL"),
  };
}

interface Doing {
  readonly at: string;
  readonly act: () => void;
}

/** What the technicians do on a day by habit. */
function visits(run: Run, day: number): Doing[] {
  const { truth, chance } = run;
  const { habits, pumps } = truth;
  const weekday = new Date(minuteOf(truth, day, "00:00") * 60_000).getUTCDay();
  const isFull = weekday === habits.fullTestOn || day === 0 || day === truth.days;
  const isSetting = day === 0 || habits.setOnDays.includes(day);
  const missed = chance.uniform() < habits.daysMissed;
  const who = habits.people[Math.floor(chance.uniform() * habits.people.length)] ?? null;
  const isLast = day === truth.days;
  const doings: Doing[] = [];
  if (!missed || isFull || isSetting)
    doings.push(
      { at: "07:30", act: () => testHardness(run, day, isFull, who) },
      { at: "07:45", act: () => testWater(run, who) },
    );
  if (isLast) return doings;
  doings.push({
    at: "08:30",
    act: () => {
      const isDue = isSetting && run.tests.length >= 3;
      if (day === 0 || isDue || wantsSetting(run.tests, day, habits)) setPumps(run, day === 0, who);
    },
  });
  if (isFull) doings.push({ at: "09:00", act: () => giveMagnesium(run, who) });
  if (habits.exchange && weekday === habits.exchange.on)
    doings.push({ at: "10:00", act: () => renew(run, who) });
  if (weekday === habits.fillOn || day === 0)
    for (const [index, { name, holdsL }] of pumps.entries())
      doings.push({
        at: `11:${index}0`,
        act: () => void note(run, { did: "filled", pump: name, litres: holdsL }, who),
      });
  return doings;
}

type Done<E = LogEvent> = E extends unknown ? Omit<E, "minute" | "by"> : never;

const note = (run: Run, done: Done, by: string | null): void =>
  void run.events.push({ minute: run.minute, by, ...done } as LogEvent);

function test(run: Run, of: ReadParameter, value: number, how: Test) {
  return { of, shows: shown(value, how, run.chance), step: how.step };
}

function testHardness(run: Run, day: number, isFull: boolean, who: string | null): void {
  const { kit } = run.truth;
  const alkalinity = test(run, "alkalinity", truly.alkalinity(run.water), kit.alkalinityDkh);
  const values = [alkalinity];
  run.tests.push({ day, alkalinityDkh: alkalinity.shows });
  if (isFull) {
    const calcium = test(run, "calcium", truly.calcium(run.water), kit.calciumMgPerL);
    const magnesium = test(run, "magnesium", truly.magnesium(run.water), kit.magnesiumMgPerL);
    run.calciumTests.push(calcium.shows);
    run.lastMagnesiumMgPerL = magnesium.shows;
    values.push(calcium, magnesium);
  }
  note(run, { did: "read", values, kit: kit.name, disregard: null }, who);
}

function testWater(run: Run, who: string | null): void {
  const { truth, minute } = run;
  const hour = (minute % minutesPerDay) / minutesPerHour;
  const values = [
    test(run, "salinity", truly.salinity(run.water), truth.kit.salinity),
    test(run, "temperature", truth.temperatureDegC, truth.kit.temperatureDegC),
    test(run, "pH", pHAt(truth, hour), truth.kit.pH),
  ];
  note(run, { did: "read", values, kit: null, disregard: null }, who);
}

function setPumps(run: Run, isFirst: boolean, who: string | null): void {
  const { truth, tests, setMlPerDay, calciumTests } = run;
  const { habits } = truth;
  let alkalinityMeqPerDay = 0;
  for (const pump of truth.pumps) {
    if (pump.serves !== "alkalinity") continue;
    const now = setMlPerDay.get(pump.name) ?? 0;
    const next = isFirst ? pump.startMlPerDay : alkalinitySetting(pump, now, tests, habits);
    setMlPerDay.set(pump.name, next);
    alkalinityMeqPerDay += next * pump.solution.alkalinityMeqPerMl;
  }
  for (const pump of truth.pumps) {
    if (pump.serves !== "calcium") continue;
    setMlPerDay.set(
      pump.name,
      isFirst ? pump.startMlPerDay : calciumSetting(pump, alkalinityMeqPerDay, calciumTests, habits),
    );
  }
  run.tests = [];
  const pumps = truth.pumps.map(({ name }) => ({ name, mlPerDay: setMlPerDay.get(name) ?? 0 }));
  note(run, { did: "set", pumps }, who);
}

function giveMagnesium(run: Run, who: string | null): void {
  const { truth, lastMagnesiumMgPerL } = run;
  const { magnesiumByHand } = truth.habits;
  if (!magnesiumByHand || lastMagnesiumMgPerL === null) return;
  const millilitres = magnesiumDose(lastMagnesiumMgPerL, truth.habits);
  if (millilitres === 0) return;
  run.water = dosed(run.water, truth, magnesiumByHand.solution, millilitres);
  note(run, { did: "gave", solution: magnesiumByHand.solution.name, millilitres }, who);
}

function renew(run: Run, who: string | null): void {
  const { exchange } = run.truth.habits;
  if (!exchange) return;
  run.water = renewed(run.water, run.truth, exchange.litres);
  note(run, { did: "renewed", litres: exchange.litres, water: exchange.water }, who);
}

function happen(run: Run, happening: Happening): void {
  const { truth, stock, stopped } = run;
  switch (happening.what) {
    case "stocked":
    case "removed": {
      const { what, cohort: name, amount } = happening;
      const cohort = truth.cohorts.find((one) => one.name === name);
      if (!cohort) throw new Error(`The truth of ${truth.system} knows no cohort ${name}.`);
      stock.set(name, (stock.get(name) ?? 0) + (what === "stocked" ? amount : -amount));
      note(run, { did: what, cohort: name, amount, countedIn: cohort.countedIn }, null);
      return;
    }
    case "stopped":
      stopped.add(happening.pump);
      note(run, { did: "stopped", pump: happening.pump }, null);
      return;
    case "started":
      stopped.delete(happening.pump);
      note(run, { did: "started", pump: happening.pump }, null);
      return;
    case "note":
      note(run, { did: "note", text: happening.text }, null);
      return;
    case "disregarded": {
      const wrong = truly.alkalinity(run.water) + happening.wrongByDkh;
      const values = [test(run, "alkalinity", wrong, truth.kit.alkalinityDkh)];
      note(run, { did: "read", values, kit: truth.kit.name, disregard: happening.why }, null);
      return;
    }
  }
}
