-- Uses the server as a person in Neovim does and prints what there was to see, as JSON.

local seen = {}

local function await(what, condition)
  if not vim.wait(20000, condition, 20) then
    error('no ' .. what .. ' in time; seen so far: ' .. vim.json.encode(seen))
  end
end

local function position(line, column)
  return { textDocument = vim.lsp.util.make_text_document_params(0), position = { line = line, character = column } }
end

local function ask(method, params)
  local answers = vim.lsp.buf_request_sync(0, method, params, 20000)
  local _, answer = next((assert(answers, method .. ' was not answered')))
  assert(not answer.err, vim.inspect(answer.err))
  return answer.result
end

local function rules()
  return vim.tbl_map(function(one)
    return one.code
  end, vim.diagnostic.get(0))
end

local function check(script, markdown, prose)
  vim.cmd.edit(script)
  seen.filetype = vim.bo.filetype
  seen.commentstring = vim.bo.commentstring
  seen.syntax = vim.fn.synIDattr(vim.fn.synID(1, 1, 1), 'name')

  await('client', function()
    return #vim.lsp.get_clients({ bufnr = 0, name = 'tussock' }) == 1
  end)
  local client = vim.lsp.get_clients({ bufnr = 0, name = 'tussock' })[1]
  seen.encoding = client.offset_encoding

  -- The text names a column that the file lacks, behind a wide character.
  await('diagnostics', function()
    return #vim.diagnostic.get(0) > 0
  end)
  local mistake = vim.diagnostic.get(0)[1]
  seen.mistake = { mistake.code, mistake.lnum, mistake.col, mistake.end_col, mistake.source }

  vim.api.nvim_win_set_cursor(0, { mistake.lnum + 1, mistake.col + 1 })
  vim.lsp.buf.code_action({ apply = true })
  await('mend', function()
    return #vim.diagnostic.get(0) == 0
  end)
  seen.mended = vim.api.nvim_buf_get_lines(0, mistake.lnum, mistake.lnum + 1, false)[1]

  seen.hover = ask('textDocument/hover', position(0, 2)).contents.value

  local label = 'label `crew 🚢`.al'
  -- As typed: a new line, and the first letters of a column.
  vim.api.nvim_buf_set_lines(0, -1, -1, false, { label })
  local last = vim.api.nvim_buf_line_count(0) - 1
  seen.completion = vim.tbl_map(function(item)
    return item.textEdit.newText
  end, ask('textDocument/completion', position(last, #label)))
  vim.api.nvim_buf_set_lines(0, -2, -1, false, {})

  seen.outline = vim.tbl_map(function(symbol)
    return symbol.name
  end, ask('textDocument/documentSymbol', { textDocument = vim.lsp.util.make_text_document_params(0) }))

  vim.api.nvim_buf_set_lines(0, 0, 0, false, { 'policy   alpha .05' })
  vim.lsp.buf.format()
  seen.formatted = vim.api.nvim_buf_get_lines(0, 0, 1, false)[1]
  seen.rules_at_the_end = rules()

  vim.cmd.edit({ markdown, bang = true })
  await('diagnostics in Markdown', function()
    return #vim.diagnostic.get(0) > 0
  end)
  local found = vim.diagnostic.get(0)[1]
  seen.markdown = { found.code, found.lnum }
  seen.fence = vim.fn.synIDattr(vim.fn.synID(4, 1, 1), 'name')

  vim.cmd.edit(prose)
  vim.wait(300)
  seen.clients_of_prose = #vim.lsp.get_clients({ bufnr = 0 })

  vim.lsp.stop_client(vim.lsp.get_clients())
  await('end of the server', function()
    return client:is_stopped()
  end)
end

local ok, message = pcall(check, vim.env.SCRIPT, vim.env.MARKDOWN, vim.env.PROSE)
seen.error = not ok and message or nil
vim.fn.writefile({ vim.json.encode(seen) }, vim.env.SEEN)
vim.cmd('qall!')
