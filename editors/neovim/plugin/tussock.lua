-- Starts the language server for the files that it knows.

if vim.lsp.enable then
  vim.lsp.enable('tussock')
elseif vim.lsp.start then
  -- Neovim 0.8 to 0.10.
  vim.api.nvim_create_autocmd('FileType', {
    pattern = 'tussock',
    callback = function(event)
      vim.lsp.start({
        name = 'tussock',
        cmd = { 'tussock', 'server' },
        root_dir = vim.fn.fnamemodify(event.file, ':p:h'),
      })
    end,
  })
end

-- Colours in the fences of Markdown files.
local fenced = vim.g.markdown_fenced_languages or {}
if not vim.tbl_contains(fenced, 'tussock') then
  vim.g.markdown_fenced_languages = vim.list_extend(vim.deepcopy(fenced), { 'tussock' })
end
