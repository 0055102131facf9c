-- The language server. Neovim 0.11 and later read this file; `plugin/tussock.lua` enables it.

-- A Markdown file has the server only if it holds Tussock code.
local function has_code(buffer)
  if vim.bo[buffer].filetype ~= 'markdown' then
    return true
  end
  for _, line in ipairs(vim.api.nvim_buf_get_lines(buffer, 0, -1, false)) do
    if line:match('^%s*```+%s*{?tussock') or line:match('^%s*~~~+%s*{?tussock') then
      return true
    end
  end
  return false
end

return {
  cmd = { 'tussock', 'server' },
  filetypes = { 'tussock', 'markdown' },
  root_dir = function(buffer, start)
    if has_code(buffer) then
      local name = vim.api.nvim_buf_get_name(buffer)
      start(vim.fs.root(buffer, '.git') or (name ~= '' and vim.fs.dirname(name)) or vim.fn.getcwd())
    end
  end,
}
