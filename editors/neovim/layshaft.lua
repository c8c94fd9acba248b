-- Layshaft specs in Neovim 0.11 and later: the file type, the server, results at the ends of lines, and colours from the
-- tree where the parser is installed.
vim.filetype.add({ extension = { shaft = "shaft" } })

vim.lsp.config("layshaft", {
  cmd = { "layshaft", "lsp" },
  filetypes = { "shaft" },
  root_markers = { "layshaft.toml" },
})
vim.lsp.enable("layshaft")

vim.api.nvim_create_autocmd("FileType", {
  pattern = "shaft",
  callback = function(event)
    vim.bo[event.buf].commentstring = "# %s"
    vim.lsp.inlay_hint.enable(true, { bufnr = event.buf })
    if vim.treesitter.language.add("shaft") then
      vim.treesitter.start(event.buf, "shaft")
      vim.wo[0][0].foldexpr = "v:lua.vim.treesitter.foldexpr()"
    end
  end,
})
