-- inkjoule in Neovim's built-in language client, 0.7 and newer.
--
--   require('inkjoule').setup()                      -- `inkjoule` on the PATH
--   require('inkjoule').setup { cmd = { '/opt/inkjoule', 'serve' }, hints = false }
--
-- Neovim 0.10 shows computed values (inlay hints) itself; for older ones this
-- file writes them at the line ends.
local M = {}

local options = { cmd = { 'inkjoule', 'serve' }, hints = true, on_attach = nil }
local values = vim.api.nvim_create_namespace('inkjoule-values')
local clients = {} -- id by root, for Neovim 0.7

local function root_of(buffer)
  local folder = vim.fn.fnamemodify(vim.api.nvim_buf_get_name(buffer), ':p:h')
  for _, mark in ipairs { 'inkjoule.toml', '.git' } do
    local file = vim.fn.findfile(mark, folder .. ';')
    local found = file ~= '' and file or vim.fn.finddir(mark, folder .. ';')
    if found ~= '' then return vim.fn.fnamemodify(found, ':p:h' .. (file == '' and ':h' or '')) end
  end
  return folder
end

-- Draws the hints of a reply, unless the text has changed since the question.
local function draw(buffer, asked_at, hints)
  if not vim.api.nvim_buf_is_valid(buffer) or vim.api.nvim_buf_get_changedtick(buffer) ~= asked_at then return end
  vim.api.nvim_buf_clear_namespace(buffer, values, 0, -1)
  for _, hint in ipairs(hints or {}) do
    local label = hint.label
    if type(label) == 'table' then
      label = table.concat(vim.tbl_map(function(part) return part.value end, label))
    end
    vim.api.nvim_buf_set_extmark(buffer, values, hint.position.line, 0, {
      virt_text = { { label, 'Comment' } },
      virt_text_pos = 'eol',
      priority = 10, -- before the diagnostics of the same line
    })
  end
end

local function ask_for_values(client, buffer)
  if not vim.api.nvim_buf_is_valid(buffer) then return end
  local asked_at = vim.api.nvim_buf_get_changedtick(buffer)
  client.request('textDocument/inlayHint', {
    textDocument = { uri = vim.uri_from_bufnr(buffer) },
    range = {
      start = { line = 0, character = 0 },
      ['end'] = { line = vim.api.nvim_buf_line_count(buffer), character = 0 },
    },
  }, function(err, result)
    if not err then draw(buffer, asked_at, result) end
  end, buffer)
end

-- Asks again a moment after the last change.
local function follow_values(client, buffer)
  local pending
  local function soon()
    if pending then pending:stop() end
    pending = vim.defer_fn(function() ask_for_values(client, buffer) end, 200)
  end
  vim.api.nvim_buf_attach(buffer, false, {
    on_lines = function() soon() end,
    on_detach = function() if pending then pending:stop() end end,
  })
  soon()
end

local function on_attach(client, buffer)
  if options.hints then
    if vim.lsp.inlay_hint and vim.lsp.inlay_hint.enable then
      pcall(vim.lsp.inlay_hint.enable, true, { bufnr = buffer })
    else
      follow_values(client, buffer)
    end
  end
  if options.on_attach then options.on_attach(client, buffer) end
end

local function config(buffer)
  local capabilities = vim.lsp.protocol.make_client_capabilities()
  capabilities.textDocument.inlayHint = capabilities.textDocument.inlayHint or { dynamicRegistration = false }
  return {
    name = 'inkjoule',
    cmd = options.cmd,
    root_dir = root_of(buffer),
    capabilities = capabilities,
    on_attach = on_attach,
  }
end

-- Starts the server for a buffer, or joins the one that serves its folder.
function M.attach(buffer)
  if vim.fn.executable(options.cmd[1]) == 0 then
    vim.notify(("inkjoule: the program '%s' was not found, so notes are not checked; put it on the PATH or name it in setup { cmd = … }")
      :format(options.cmd[1]), vim.log.levels.WARN)
    return
  end
  local wanted = config(buffer)
  if vim.lsp.start then
    vim.lsp.start(wanted, { bufnr = buffer })
    return
  end
  local id = clients[wanted.root_dir]
  if not id or not vim.lsp.get_client_by_id(id) then
    id = vim.lsp.start_client(wanted)
    clients[wanted.root_dir] = id
  end
  vim.lsp.buf_attach_client(buffer, id)
end

function M.setup(given)
  options = vim.tbl_extend('force', options, given or {})
  local group = vim.api.nvim_create_augroup('inkjoule', { clear = true })
  vim.api.nvim_create_autocmd('FileType', {
    group = group,
    pattern = 'joule',
    callback = function(event) M.attach(event and event.buf or vim.api.nvim_get_current_buf()) end,
  })
end

M.namespace = values

return M
