/** For an extension: today's plan as lines of the log. */
import { planEdits, whyNoPlanEdit } from "../../editor/plan-edits.ts";
import { marlRequest, type OfSystem, type PlanAnswer, type Refusal } from "../requests.ts";
import { about, type Feature } from "../session.ts";

type Reply = PlanAnswer | Refusal | null;

export const writePlanFeature: Feature = {
  title: "Writing the plan",
  about:
    "for an extension, `marl/planEdit`: the lines that set the pumps as planned, or why there is nothing to write. An editor without has the action of the same name",
  offers: () => ({}),
  listen: (session) => {
    const { connection, convert } = session;
    connection.onRequest<Reply, void>(marlRequest.planEdit, ({ uri, system: ref }: OfSystem, token) =>
      about(session, uri, token, (look): Reply => {
        const { farm } = look;
        const system = farm.bound.model.systems.get(ref);
        if (!system) return null;
        const [plan] = planEdits(farm, system);
        const file = plan?.edits[0]?.file;
        if (!plan || file === undefined) return { refusal: whyNoPlanEdit(farm, system) };
        return {
          title: plan.title,
          edit: convert.workspaceEdit(look, plan.edits),
          uri: look.uriOf(file),
        };
      }),
    );
  },
};
