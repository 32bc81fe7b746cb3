-- What a user writes into init.lua (see ../README.md), with the folders of this repository.
local editors = vim.fn.fnamemodify(debug.getinfo(1, 'S').source:sub(2), ':p:h:h:h')
vim.opt.runtimepath:prepend { editors .. '/vim', editors .. '/neovim' }
vim.opt.swapfile = false
require('inkjoule').setup { cmd = { os.getenv('INKJOULE'), 'serve' } }
