-- Opens each file of the folder in neovim, for clients_test.go, and writes to $REPORT,
-- as JSON, what the marks of each cover.

local patience = 30000 -- milliseconds for each file

local function marked()
  return vim.tbl_map(function(mark)
    return vim.api.nvim_buf_get_text(0, mark.lnum, mark.col, mark.end_lnum, mark.end_col, {})[1]
  end, vim.diagnostic.get(0))
end

local function session()
  local report = {}
  for _, name in ipairs(vim.fn.glob("*", false, true)) do
    vim.cmd("edit " .. name)
    local found = vim.wait(patience, function()
      return #vim.diagnostic.get(0) > 0
    end, 10)
    assert(found, name .. " has no marks; its type is " .. vim.bo.filetype)
    report[name] = marked()
  end
  vim.fn.writefile({ vim.json.encode(report) }, vim.env.REPORT)
end

local ok, problem = pcall(session)
if not ok then
  io.stderr:write(problem, "\n")
  vim.cmd("cquit")
end
vim.cmd("qall!")
