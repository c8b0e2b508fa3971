/** Whether what is given is in the proportion that the corals' mineral takes: shown, not assumed. */
import { calcificationPerMeq } from "../chemistry/calcification.ts";
import type { Plan, Situation, SourceInPlan } from "./make-plan.ts";
import { topOffFlow } from "./rates.ts";
import { broughtPerLitre, type Dosed } from "./tracked.ts";

export interface Balance {
  /** mg given by maintenance for each meq of alkalinity; null where no alkalinity is given. */
  readonly given: { readonly calciumMgPerMeq: number; readonly magnesiumMgPerMeq: number } | null;
  /** mg that the mineral takes for each meq. */
  readonly taken: { readonly calciumMgPerMeq: number; readonly magnesiumMgPerMeq: number };
  /** How much of a calcium part goes with 1 mL of an alkalinity part. */
  readonly pairs: readonly {
    readonly alkaline: string;
    readonly calcic: string;
    readonly millilitres: number;
  }[];
}

/** Balance of the plan's maintenance, with what a top-off solution brings, against the mineral laid down. */
export function balanceOf(
  plan: Plan,
  { constants, state, uptake }: Pick<Situation, "constants" | "state" | "uptake">,
): Balance {
  const mineral = calcificationPerMeq(uptake.magnesiumFraction);
  const topOff = topOffFlow(constants, state.minute);
  const inTopOff = topOff && constants.strengthAt(topOff.solution, state.minute);
  const given = (name: Dosed): number =>
    plan.sources.reduce(
      (sum, { strength }, index) => {
        const litres = plan.answer.sources[index]?.maintenanceLPerDay ?? 0;
        return sum + litres * (broughtPerLitre(strength, name) ?? 0);
      },
      topOff && inTopOff ? topOff.litresPerDay * (broughtPerLitre(inTopOff, name) ?? 0) : 0,
    );
  const alkalinity = given("alkalinity");
  const brings = (name: Dosed) => plan.sources.filter((source) => perLitre(source, name) > 0);
  const onlyAlkaline = brings("alkalinity").filter((source) => perLitre(source, "calcium") === 0);
  const onlyCalcic = brings("calcium").filter((source) => perLitre(source, "alkalinity") === 0);
  return {
    given:
      alkalinity > 0
        ? {
            calciumMgPerMeq: given("calcium") / alkalinity,
            magnesiumMgPerMeq: given("magnesium") / alkalinity,
          }
        : null,
    taken: { calciumMgPerMeq: mineral.calciumMg, magnesiumMgPerMeq: mineral.magnesiumMg },
    pairs: onlyAlkaline.flatMap((alkaline) =>
      onlyCalcic.map((calcic) => ({
        alkaline: alkaline.source.solution,
        calcic: calcic.source.solution,
        millilitres: (perLitre(alkaline, "alkalinity") * mineral.calciumMg) / perLitre(calcic, "calcium"),
      })),
    ),
  };
}

const perLitre = ({ strength }: SourceInPlan, name: Dosed): number => broughtPerLitre(strength, name) ?? 0;
