/** The page that explains a problem, by the problem's code. No VS Code in here. */

/** `water/leaves-hold` → its page in the extension's folder; null for what is no code. */
export const pageOf = (code: string): string | null =>
  /^[a-z]+(\/[a-z0-9-]+)+$/i.test(code) ? `docs/problems/${code.replaceAll("/", "-")}.md` : null;
