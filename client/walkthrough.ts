/** The first steps with the extension, four of them: for the manifest. No VS Code in here. */

const media = (name: string) => ({ markdown: `client/media/${name}.md` });

const does = (command: string, label: string): string => `[${label}](command:${command})`;

export const walkthrough = {
  id: "firstSteps",
  title: "First steps with Marl",
  description: "From a folder of text files to today's doses",
  steps: [
    {
      id: "open",
      title: "Open the farm",
      description: `A farm is a folder with one file a system, its log in the same file or another. Open it, then one of its files that end in .marl.\n${does("vscode.openFolder", "Open a Folder")}`,
      media: media("open-the-farm"),
      completionEvents: ["onContext:marl.hasStarted"],
    },
    {
      id: "record",
      title: "Record a reading",
      description: `Type the values one by one, with the last ones in sight. One line goes into the system's log.\n${does("marl.recordReading", "Record a Reading")}`,
      media: media("record-a-reading"),
      completionEvents: ["onCommand:marl.recordReading"],
    },
    {
      id: "doses",
      title: "Read the doses",
      description: `The sheet stands beside the file and follows what you write: today's doses, the water, and where it is going.\n${does("marl.showDoseSheet", "Show the Dose Sheet")}`,
      media: media("read-the-doses"),
      completionEvents: ["onCommand:marl.showDoseSheet"],
    },
    {
      id: "mend",
      title: "Mend a problem",
      description: `What is wrong is underlined. Put the cursor there and choose what to do about it, or have it explained.\n${does("marl.explainProblem", "Explain This Problem")}`,
      media: media("mend-a-problem"),
      completionEvents: ["onCommand:marl.explainProblem"],
    },
  ],
} as const;
