/** Writes today's plan into the log. */
import { window } from "vscode";
import { marlRequest, type PlanAnswer, type Refusal } from "../server/protocol/requests.ts";
import { type Named, systemHere } from "./here.ts";
import type { Server } from "./server.ts";
import { writeEdit } from "./write-edit.ts";

/** So long a word on what was done stays in the status bar, ms. */
const saidFor = 6000;

export async function writePlan(server: Server, named: Named): Promise<void> {
  const here = await systemHere(server, named);
  if (!here) return;
  const answer = await server.ask<PlanAnswer | Refusal>(marlRequest.planEdit, here);
  if (!answer) return;
  if ("refusal" in answer) {
    void window.showInformationMessage(answer.refusal);
    return;
  }
  if (await writeEdit(server, answer)) window.setStatusBarMessage(`${here.name}: ${answer.title}`, saidFor);
}
