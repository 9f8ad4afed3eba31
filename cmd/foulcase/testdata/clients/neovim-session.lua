-- A session of neovim with foulcase, for clients_test.go: opens $DOCUMENT, waits for
-- $MARKS marks, corrects $CORRECT and makes $HOUSE a house word by code actions, puts
-- "🪢 " before each line that has text and $MEANT for $RETYPED, and writes what the
-- editor shows after each step to $REPORT, as JSON.

local patience = 30000 -- milliseconds for each step

local function await(what, condition)
  if not vim.wait(patience, condition, 10) then
    error(what .. " is waited for in vain; shown are " .. vim.inspect(vim.diagnostic.get(0)))
  end
end

local function await_marks(count, when)
  await(count .. " marks, " .. when, function()
    return #vim.diagnostic.get(0) == count
  end)
end

-- covered is the text under a mark.
local function covered(mark)
  return vim.api.nvim_buf_get_text(0, mark.lnum, mark.col, mark.end_lnum, mark.end_col, {})[1]
end

-- shown is the text, with its marks in the order of the text; columns are in bytes.
local function shown()
  local marks = vim.tbl_map(function(mark)
    return { line = mark.lnum, start = mark.col, stop = mark.end_col, covers = covered(mark), message = mark.message }
  end, vim.diagnostic.get(0))
  table.sort(marks, function(a, b)
    return a.line < b.line or a.line == b.line and a.start < b.start
  end)
  return { text = table.concat(vim.api.nvim_buf_get_lines(0, 0, -1, true), "\n") .. "\n", marks = marks }
end

-- act takes the first code action on a form whose title begins with some words.
local function act(form, title)
  local mark = vim.tbl_filter(function(mark)
    return covered(mark) == form
  end, vim.diagnostic.get(0))[1]
  vim.api.nvim_win_set_cursor(0, { mark.lnum + 1, mark.col })
  local offered
  vim.ui.select = function(items, options, choose)
    offered = vim.tbl_map(options.format_item, items)
    for i, item in ipairs(items) do
      if vim.startswith(offered[i], title) then
        return choose(item)
      end
    end
    error("no code action begins with " .. title .. " among " .. vim.inspect(offered))
  end
  vim.lsp.buf.code_action()
  await("an offer of code actions", function()
    return offered
  end)
end

local function session()
  vim.lsp.set_log_level("trace")
  vim.cmd("edit " .. vim.env.DOCUMENT)
  local count = tonumber(vim.env.MARKS)
  local report = {}

  await_marks(count, "the document opened")
  report.opened = shown()

  act(vim.env.CORRECT, "Correct to")
  await_marks(count - 1, "one corrected")
  report.corrected = shown()

  act(vim.env.HOUSE, "Add ")
  await_marks(count - 2, "one a house word")
  report.housed = shown()

  vim.cmd([[silent %s/^\ze./🪢 /]])
  vim.cmd("undo")
  vim.cmd("redo")
  vim.cmd("silent %s/" .. vim.env.RETYPED .. "/" .. vim.env.MEANT .. "/")
  await_marks(count - 3, "lines changed and one retyped")
  report.typed = shown()

  vim.cmd("write")
  vim.lsp.stop_client(vim.lsp.get_active_clients())
  await("the end of the server", function()
    return #vim.lsp.get_active_clients() == 0
  end)
  vim.fn.writefile({ vim.json.encode(report) }, vim.env.REPORT)
end

local ok, problem = xpcall(session, debug.traceback)
if not ok then
  io.stderr:write(problem, "\n", table.concat(vim.fn.readfile(vim.lsp.get_log_path()), "\n"), "\n")
  vim.cmd("cquit")
end
vim.cmd("qall!")
