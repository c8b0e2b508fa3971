// Drives one window of VS Code as a person does, by the keyboard, and reads what stands on the screen.
import { readFileSync } from "node:fs";
import { join } from "node:path";

const editor = ".editor-group-container.active .monaco-editor";

/** So long something may take on a busy machine before the step is given up, ms. */
const patience = 60_000;

/** Opens a folder in a window of its own; what the browser keeps is shared, so that the next one opens sooner. */
export async function openWindow(context, code, farm) {
  const page = await context.newPage();
  await page.setViewportSize({ width: 1280, height: 800 });
  page.setDefaultTimeout(patience);
  await page.goto(code.address(farm.path));
  await page.locator(".monaco-workbench").waitFor();
  await page.locator(".explorer-folders-view .monaco-list-row").first().waitFor();
  return driver(page, farm);
}

function driver(page, farm) {
  const key = (...keys) => inTurn(keys, (one) => page.keyboard.press(one));
  const type = (text) => page.keyboard.type(text);
  const quickInput = page.locator(".quick-input-widget:visible");
  let opened = "";

  /** Opens an input at the top of the window and fills it. What is typed while something else takes the keyboard is lost, so it is done again. */
  async function ask(shortcut, text) {
    await until(`an input after ${shortcut}`, async () => {
      await key(shortcut);
      if (!(await appears(quickInput, 2000))) return false;
      await type(text);
      const input = quickInput.locator("input").first();
      const typed = await input.inputValue({ timeout: 2000 }).catch(() => "");
      if (typed.endsWith(text)) return true;
      await key("Escape");
      return false;
    });
  }

  const chosen = (text) => page.locator(".quick-input-list .monaco-list-row.focused", { hasText: text });
  const at = (row, column) =>
    page.locator("#status\\.editor\\.selection", { hasText: `Ln ${row}, Col ${column}` });
  const lines = page.locator(`${editor} .view-lines > .view-line`);

  const driven = {
    page,
    farm,
    key,
    type,
    chosen,
    quickInput,
    /** The lines on the screen that hold a text; in the editor a space may be one that doesn't break. */
    line: (text) => lines.filter({ hasText: anySpace(text) }),
    /** The same in the editors that aren't being typed in. */
    lineBeside: (text) =>
      page.locator(".editor-group-container:not(.active) .view-line", { hasText: anySpace(text) }),
    /** A name that has a colour of its own, as only the server can give it. */
    coloured: (name) => lines.locator("span span", { hasText: new RegExp(`^${name}$`) }).first(),
    onDisk: (file) => readFileSync(join(farm.path, file), "utf8"),

    async open(file) {
      await ask("Control+p", file);
      const [name, folder = ""] = file.split("/").reverse();
      await chosen(name).filter({ hasText: folder }).waitFor();
      await key("Enter");
      await page.locator(".editor-group-container.active .tab.active", { hasText: name }).waitFor();
      await lines.first().waitFor();
      // A file that was open before is shown where it was left.
      await key("Control+Home");
      await at(1, 1).waitFor();
      opened = file;
    },

    /** Runs a command of the palette by its whole name. */
    async command(name) {
      await ask("F1", name);
      await driven.pick(name);
    },

    /** Takes the row with a text, which need not be the first, from the list at the top. */
    async pick(text) {
      await page.locator(".quick-input-list .monaco-list-row", { hasText: text }).first().waitFor();
      await driven.arrowTo(chosen(text));
      await key("Enter");
    },

    /** Puts the cursor where `|` stands in a piece of the file as it is on disk. */
    async cursor(piece) {
      const text = driven.onDisk(opened);
      const found = text.indexOf(piece.replace("|", ""));
      if (found < 0) throw new Error(`${opened} doesn't hold "${piece}"`);
      const before = text.slice(0, found + piece.indexOf("|")).split("\n");
      await driven.cursorAt(before.length, before.at(-1).length + 1);
    },

    async cursorAt(row, column) {
      await ask("Control+g", `${row}:${column}`);
      await chosen(String(row)).waitFor();
      await key("Enter");
      await at(row, column).waitFor();
    },

    /** What answers a key may still be on its way when it is first pressed. */
    async pressUntil(shortcut, shown) {
      await until(`an answer to ${shortcut}`, async () => {
        await key(shortcut);
        return appears(shown, 3000);
      });
    },

    async cursorAtEnd() {
      await key("Control+End");
    },

    /** A hover is asked again until it holds the text, since what it is made of may still be on its way. */
    async hover(text) {
      const shown = page.locator(`${editor} .monaco-hover:visible .hover-contents`, { hasText: text });
      await until(`a hover with "${text}"`, async () => {
        await key("Control+k", "Control+i");
        if (await appears(shown, 3000)) return true;
        await key("Escape");
        return false;
      });
      return driven.hovered();
    },
    hovered: async () =>
      plain((await page.locator(`${editor} .monaco-hover:visible`).allInnerTexts()).join("\n")),

    /** Picks a row of the menu of fixes, by arrow keys; `look` is done while the menu stands. */
    async fix(text, look) {
      const menu = page.locator(".action-widget:visible");
      const wanted = menu.locator(".monaco-list-row.action", { hasText: text });
      await until(`a fix "${text}"`, async () => {
        await key("Control+.");
        if (await appears(wanted, 3000)) return true;
        await key("Escape");
        return false;
      });
      await look();
      await driven.arrowTo(menu.locator(".monaco-list-row.focused", { hasText: text }));
      await key("Enter");
      await menu.waitFor({ state: "hidden" });
    },

    async arrowTo(row) {
      for (let step = 0; step < 60; step++) {
        if (await row.isVisible()) return;
        await key("ArrowDown");
      }
      throw new Error("No such row in the menu");
    },

    /** The texts of the lines under which something is drawn, top to bottom. */
    underlined: (severity) =>
      page.evaluate(
        ([within, mark]) => {
          const rows = [...document.querySelectorAll(`${within} .view-lines > .view-line`)];
          const marks = [...document.querySelectorAll(`${within} .squiggly-${mark}`)].map((element) =>
            element.getBoundingClientRect(),
          );
          return rows
            .map((row) => ({
              box: row.getBoundingClientRect(),
              text: row.textContent.replaceAll("\u00a0", " "),
            }))
            .filter(({ box }) => marks.some(({ top }) => Math.abs(top - box.top) < box.height / 2))
            .sort((one, other) => one.box.top - other.box.top)
            .map(({ text }) => text);
        },
        [editor, severity],
      ),
    untilUnderlined: (severity, text) =>
      until(`"${text}" underlined`, async () =>
        (await driven.underlined(severity)).some((line) => line.includes(text)),
      ),
    untilNotUnderlined: (severity, text) =>
      until(`"${text}" not underlined`, async () =>
        (await driven.underlined(severity)).every((line) => !line.includes(text)),
      ),

    /** Chooses a colour theme by the name that people see; `mark` is what the window then carries. */
    async theme(name, mark) {
      const rows = quickInput.locator(".monaco-list-row", { hasText: /Dark Modern|Light Modern/ });
      // Right after the start the list still lacks them.
      await until("the list of colour themes", async () => {
        await driven.command("Preferences: Color Theme");
        if (await appears(rows, 5000)) return true;
        await key("Escape");
        return false;
      });
      await type(name);
      await driven.pick(name);
      await page.locator(`.monaco-workbench${mark}`).waitFor();
      await quickInput.waitFor({ state: "hidden" });
    },

    async save() {
      await key("Control+s");
      await page.locator(".tab.active:not(.dirty)").waitFor();
    },
    untilOnDisk: (file, text) => until(`"${text}" in ${file}`, () => driven.onDisk(file).includes(text)),

    lens: (text) => page.locator(`${editor} .codelens-decoration`, { hasText: text }),
    status: (text) => page.locator("footer .statusbar-item", { hasText: text }),
    async expectSilence() {
      const said = await page
        .locator(".notifications-toasts .notification-list-item-message")
        .allInnerTexts();
      if (said.length > 0) throw new Error(`It put up a notification: ${said.map(plain).join(" | ")}`);
    },
    /** Closes all files and puts the farm on disk back to what it was. */
    async startAnew() {
      await key("Escape");
      await driven.command("File: Save All Files");
      await page.locator(".tab.dirty").waitFor({ state: "detached" });
      await driven.command("View: Close All Editors");
      await page.locator(".tab").waitFor({ state: "detached" });
      farm.restore();
    },
    picture: (path) => page.screenshot({ path, animations: "disabled" }),
    close: () => page.close(),
  };
  return driven;
}

const anySpace = (text) => (text instanceof RegExp ? new RegExp(text.source.replaceAll(" ", "\\s+")) : text);
const plain = (text) => text.replaceAll("\u00a0", " ");

const appears = (locator, timeout) =>
  locator
    .first()
    .waitFor({ timeout })
    .then(
      () => true,
      () => false,
    );

/** Looks again and again until something is so; gives up after a while, and says what it waited for. */
export async function until(what, isSo, timeout = patience) {
  const end = Date.now() + timeout;
  while (!(await isSo())) {
    if (Date.now() > end) throw new Error(`Waited for ${what}, in vain.`);
    await new Promise((next) => setTimeout(next, 50));
  }
}

async function inTurn(items, work) {
  for (const item of items) await work(item);
}
