vim.filetype.add({ extension = { tus = 'tussock' } })
