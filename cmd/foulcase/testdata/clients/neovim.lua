local foulcase
vim.api.nvim_create_autocmd("FileType", {
  pattern = {
    "text", "markdown", "rst", "asciidoc", "tex", "plaintex", "html", "mail", "gitcommit",
    "c", "go", "javascript", "python", "sh",
  },
  callback = function(event)
    foulcase = foulcase or vim.lsp.start_client({
      name = "foulcase",
      cmd = { "foulcase", "editor" },
      root_dir = vim.fn.getcwd(),
    })
    vim.lsp.buf_attach_client(event.buf, foulcase)
  end,
})
