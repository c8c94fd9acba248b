-- Opens a spec as a user would, with the configuration of this folder, and looks at what the editor got.
-- usage: nvim --clean --headless -l test.lua CONFIG SPEC
local config, spec = arg[1], arg[2]
local failed = 0
local function check(name, ok, seen)
  print((ok and "ok   " or "FAIL ") .. name .. (seen and (": " .. tostring(seen):gsub("\n", " "):sub(1, 160)) or ""))
  if not ok then failed = failed + 1 end
end

vim.cmd("filetype on")
dofile(config)
vim.cmd.edit(spec)
local buf = vim.api.nvim_get_current_buf()
check("file type", vim.bo[buf].filetype == "shaft", vim.bo[buf].filetype)

-- The tree: the whole spec is read, every query fits the grammar, words have their colours.
local parser = vim.treesitter.get_parser(buf, "shaft", { error = false })
check("tree-sitter parser", parser ~= nil)
if parser then
  local tree = parser:parse()[1]
  check("the whole spec is read", not tree:root():has_error(), tree:root():type())
  for _, name in ipairs({ "highlights", "folds", "indents", "locals" }) do
    local fits, query = pcall(vim.treesitter.query.get, "shaft", name)
    check("query " .. name, fits and query ~= nil, not fits and query or nil)
  end
  local function captured(word, ahead)
    local pos = vim.fn.searchpos(word, "cw")
    local names = {}
    for _, capture in ipairs(vim.treesitter.get_captures_at_pos(buf, pos[1] - 1, pos[2] - 1 + (ahead or 0))) do
      names[#names + 1] = capture.capture
    end
    return names[#names]
  end
  check("colour of a kind", captured("induction_motor") == "type", captured("induction_motor"))
  check("colour of a unit", captured("60 kg", 3) == "type.builtin", captured("60 kg", 3))
  check("colour of a field", captured("breakdown_torque") == "property", captured("breakdown_torque"))
  vim.wo[0][0].foldmethod = "expr"
  vim.cmd("normal! zx")
  local inside = vim.fn.search("rated_voltage", "nw")
  check("a block folds", vim.fn.foldlevel(inside) == 1, vim.fn.foldlevel(inside))
  vim.wo[0][0].foldmethod = "manual"
end

local client
vim.wait(20000, function()
  client = vim.lsp.get_clients({ bufnr = buf, name = "layshaft" })[1]
  return client ~= nil and client.initialized
end, 20)
check("server", client ~= nil)
if not client then os.exit(1) end

local function findings() return vim.diagnostic.get(buf) end
vim.wait(1000)
check("no findings in a good spec", #findings() == 0, vim.inspect(findings()))

local function at(word)
  local pos = vim.fn.searchpos(word, "cw")
  vim.api.nvim_win_set_cursor(0, { pos[1], pos[2] - 1 })
  return vim.lsp.util.make_position_params(0, client.offset_encoding)
end
local function ask(method, params) return client:request_sync(method, params, 20000, buf).result end

local hover = ask("textDocument/hover", at("lift = motor"))
check("hover has the numbers", hover and hover.contents.value:find("1447 rpm", 1, true), hover and hover.contents.value)
local where = ask("textDocument/definition", at("block_mass;"))
check("definition", where and #vim.tbl_keys(where) > 0)
vim.wait(20000, function() return #vim.lsp.inlay_hint.get({ bufnr = buf }) > 0 end, 20)
check("results at line ends", #vim.lsp.inlay_hint.get({ bufnr = buf }) > 0)

-- A unit is broken at the keyboard, told, and mended again.
local line = vim.fn.search("let block_mass", "w")
local good = vim.fn.getline(line)
vim.fn.setline(line, (good:gsub("60 kg", "60 kgg")))
vim.wait(20000, function() return #findings() > 0 end, 20)
local first = findings()[1]
check("a broken unit is told", first ~= nil and first.severity == vim.diagnostic.severity.ERROR, first and first.message)
check("one mistake, one message", #findings() == 1, #findings())
vim.fn.setline(line, good)
vim.wait(20000, function() return #findings() == 0 end, 20)
check("gone when mended", #findings() == 0)

-- A messy line is brought into form.
vim.fn.setline(line, (good:gsub(" = ", "=")))
vim.lsp.buf.format({ timeout_ms = 20000 })
check("format", vim.fn.getline(line) == good, vim.fn.getline(line))

client:stop()
check("server ends", vim.wait(5000, function() return client:is_stopped() end, 20))
print(("%d failed"):format(failed))
os.exit(failed == 0 and 0 or 1)
