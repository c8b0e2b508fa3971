/** Asks for one value in a box that tells while typing what will become of it. */
import { InputBoxValidationSeverity, QuickInputButtons, window } from "vscode";
import type { Said } from "./reading-words.ts";

export interface Question {
  readonly title: string;
  readonly step: number;
  readonly of: number;
  readonly prompt: string;
  readonly placeholder: string;
  readonly value: string;
  /** What is said of a value; null where there is nothing to say. */
  readonly tell: (value: string) => Promise<Said | null>;
}

const severities: Readonly<Record<Said["kind"], InputBoxValidationSeverity>> = {
  preview: InputBoxValidationSeverity.Info,
  note: InputBoxValidationSeverity.Warning,
  refusal: InputBoxValidationSeverity.Error,
};

/** The value as typed; `"back"` for the question before; undefined where it was given up. */
export function askValue(question: Question): Promise<{ readonly value: string } | "back" | undefined> {
  const box = window.createInputBox();
  box.title = question.title;
  box.step = question.step;
  box.totalSteps = question.of;
  box.prompt = question.prompt;
  box.placeholder = question.placeholder;
  box.value = question.value;
  box.ignoreFocusOut = true;
  if (question.step > 1) box.buttons = [QuickInputButtons.Back];
  let asked = 0;
  const tell = async (value: string): Promise<Said | null> => {
    asked += 1;
    const mine = asked;
    const told = value.trim() === "" ? null : await question.tell(value);
    if (mine === asked)
      box.validationMessage = told ? { message: told.message, severity: severities[told.kind] } : undefined;
    return told;
  };
  return new Promise((resolve) => {
    box.onDidChangeValue((value) => void tell(value));
    box.onDidAccept(async () => {
      const { value } = box;
      const told = await tell(value);
      if (told?.kind === "refusal" || value !== box.value) return;
      resolve({ value });
      box.dispose();
    });
    box.onDidTriggerButton(() => {
      resolve("back");
      box.dispose();
    });
    box.onDidHide(() => {
      resolve(undefined);
      box.dispose();
    });
    box.show();
    void tell(question.value);
  });
}
