/** From Marl texts to the report object, without files: what the command line prints as JSON. */
import { readMoment } from "../../grammar/dates.ts";
import { advance, type Farm } from "../../server/farm.ts";
import { type Report, reportOn } from "../../server/report/report.ts";
import { wholeFarm } from "../../server/report/scope.ts";

export const moment = (text: string): number => {
  const reading = readMoment(text, "noon");
  if (!reading.known) throw new Error(`${text} is no moment`);
  return reading.moment.minute;
};

export function farmOf(files: Readonly<Record<string, string>>, at: string): Farm {
  const minute = moment(at);
  const changes = new Map(Object.entries(files).map(([file, text]) => [file, { text }]));
  return advance(null, changes, { at: minute, clock: minute });
}

/** The report as a reader of the JSON gets it. */
export function reportOf(text: string, at = "2026-12-01T08:00"): Report {
  return JSON.parse(JSON.stringify(reportOn(farmOf({ "farm.marl": text }, at), wholeFarm)));
}
