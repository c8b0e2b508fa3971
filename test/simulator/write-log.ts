/** Events → the text of a log file in tidy Marl. */
import type { LogEvent, ReadParameter } from "./events.ts";

const unitOf: Readonly<Record<ReadParameter, string>> = {
  alkalinity: " dKH",
  calcium: " mg/L",
  magnesium: " mg/L",
  salinity: "",
  temperature: " degC",
  pH: "",
};

/** A number with the digits that its step has: 7.90 where a test is read to 0.05. */
function digits(value: number, step: number): string {
  const [, decimals = ""] = String(step).split(".");
  return value.toFixed(decimals.length);
}

function words(event: LogEvent): string {
  switch (event.did) {
    case "read": {
      const values = event.values.map(({ of, shows, step }) => `${of} ${digits(shows, step)}${unitOf[of]}`);
      const kit = event.kit === null ? "" : ` with ${event.kit}`;
      const disregard = event.disregard === null ? "" : ` disregard "${event.disregard}"`;
      return `read ${values.join(", ")}${kit}${disregard}`;
    }
    case "set":
      return `set ${event.pumps.map(({ name, mlPerDay }) => `${name} ${mlPerDay} mL/day`).join(", ")}`;
    case "gave":
      return `gave ${event.solution} ${event.millilitres} mL`;
    case "renewed":
      return `renewed ${event.litres} L with ${event.water}`;
    case "stocked":
    case "removed":
      return `${event.did} ${event.cohort} ${event.amount} ${event.countedIn}`;
    case "filled":
      return `filled ${event.pump} to ${event.litres} L`;
    case "stopped":
    case "started":
      return `${event.did} ${event.pump}`;
    case "note":
      return `note "${event.text}"`;
  }
}

const moment = (minute: number): string =>
  new Date(minute * 60_000).toISOString().slice(0, 16).replace("T", " ");

/** The lines of the events, without header. */
export const logLines = (events: readonly LogEvent[]): string[] =>
  events.map(
    (event) => `  ${moment(event.minute)} ${words(event)}${event.by === null ? "" : ` by ${event.by}`}`,
  );

/** A whole file: remarks, the file used, and the log of one system. */
export function writeLog(
  events: readonly LogEvent[],
  file: { readonly system: string; readonly uses: string; readonly remarks: readonly string[] },
): string {
  const remarks = file.remarks.map((remark) => `# ${remark}`);
  const lines = [...remarks, `use "${file.uses}"`, "", `log ${file.system}`, ...logLines(events)];
  return `${lines.join("\n")}\n`;
}
