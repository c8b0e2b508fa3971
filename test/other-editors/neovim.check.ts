/** Neovim 0.7 on the example farm: problems, hover, a rename across files. */
import { readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { expect, test } from "vitest";
import { bench, run, setUpBy } from "./editors.ts";

const script = (answers: string, set: string) => `
local function body()
${set}
vim.cmd("edit " .. vim.fn.fnameescape("farm/raceways/system.marl"))
local buffer = vim.api.nvim_get_current_buf()
local answers = {}
vim.api.nvim_buf_set_lines(buffer, 3, 4, true, { '  tank upper 300 cm x 80 cm x 30 kg' })
local told = vim.wait(15000, function()
  for _, each in ipairs(vim.diagnostic.get(buffer)) do
    if each.code == "unit/dimension" then return true end
  end
  return false
end, 20)
answers.told = told
answers.problems = {}
for _, each in ipairs(vim.diagnostic.get(buffer)) do
  table.insert(answers.problems, { line = each.lnum, column = each.col, code = each.code, message = each.message })
end
local function ask(method, line, column, more)
  local params = vim.tbl_extend("force", {
    textDocument = vim.lsp.util.make_text_document_params(buffer),
    position = { line = line, character = column },
  }, more or {})
  local results = vim.lsp.buf_request_sync(buffer, method, params, 15000)
  for _, each in pairs(results or {}) do return each.result, each.error end
end
local pump
for number, text in ipairs(vim.api.nvim_buf_get_lines(buffer, 0, -1, true)) do
  local at = text:find("carbonate%-part")
  if at then pump = { number - 1, at } end
end
answers.hover = ask("textDocument/hover", pump[1], pump[2])
local edit = ask("textDocument/rename", pump[1], pump[2], { newName = "soda-part" })
vim.lsp.util.apply_workspace_edit(edit, "utf-16")
vim.cmd("silent wall")
local file = assert(io.open("${answers}", "w"))
file:write(vim.fn.json_encode(answers))
file:close()
end
local ok, why = pcall(body)
if not ok then io.stderr:write(tostring(why) .. "\\n") vim.cmd("cquit") end
vim.cmd("qall!")
`;

test("Neovim shows problems and a hover, and renames across files", () => {
  const place = bench();
  const answers = join(place.folder, "answers.json");
  const file = join(place.folder, "script.lua");
  writeFileSync(file, script(answers, setUpBy("neovim.md", "lua")));
  const ended = run(place, ["nvim", "--headless", "-u", "NONE", "-i", "NONE", "-n", "-c", `luafile ${file}`]);
  expect(ended.status, ended.out).toBe(0);
  const found = JSON.parse(readFileSync(answers, "utf8"));
  expect(found.told, JSON.stringify(found.problems)).toBe(true);
  const dimension = found.problems.find(({ code }: { code: string }) => code === "unit/dimension");
  expect(dimension).toMatchObject({ line: 3 });
  expect(dimension.message).toContain("kg");
  const hover: string = found.hover.contents.value;
  expect(hover).toContain("carbonate-part");
  expect(hover).toMatch(/brings \d\S* meq of alkalinity/);
  const read = (name: string) => readFileSync(join(place.farm, name), "utf8");
  for (const name of ["solutions.marl", "raceways/system.marl", "farm.marl"]) {
    expect(read(name), name).toMatch(/\bsoda-part\b/);
    expect(read(name), name).not.toMatch(/\bcarbonate-part\b/);
  }
});
