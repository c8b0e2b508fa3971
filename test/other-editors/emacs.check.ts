/** Emacs in batch with Eglot on the example farm: problems. */
import { readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { expect, test } from "vitest";
import { bench, run, setUpBy } from "./editors.ts";

const script = (answers: string, set: string) => `
(package-initialize)
${set}
(find-file "farm/raceways/system.marl")
(goto-char (point-min))
(search-forward "30 cm")
(replace-match "30 kg")
(apply #'eglot--connect (eglot--guess-contact))
(flymake-mode 1)
(flymake-start)
(defun found ()
  (seq-filter (lambda (each) (string-match-p "kg" (flymake-diagnostic-text each))) (flymake-diagnostics)))
(with-timeout (20 nil)
  (while (null (found)) (accept-process-output nil 0.1)))
(let ((told (mapconcat (lambda (each) (format "%d\\t%s" (line-number-at-pos (flymake-diagnostic-beg each))
                                              (flymake-diagnostic-text each)))
                       (found) "\\n")))
  (with-temp-file "${answers}" (insert told)))
(with-current-buffer "system.marl" (set-buffer-modified-p nil))
(eglot-shutdown (eglot-current-server) nil 10)
(kill-emacs 0)
`;

test("Emacs shows problems", () => {
  const place = bench();
  const answers = join(place.folder, "answers.txt");
  const file = join(place.folder, "script.el");
  writeFileSync(file, script(answers, setUpBy("emacs.md", "elisp")));
  const ended = run(place, ["emacs", "--batch", "-l", file]);
  expect(ended.status, ended.out).toBe(0);
  const told = readFileSync(answers, "utf8").trim().split("\n");
  expect(
    told.some((line) => line.startsWith("4\t") && line.includes("kg")),
    told.join("\n"),
  ).toBe(true);
});
