-- Runs inside Neovim on the open note and writes what Neovim shows of it to
-- $INKJOULE_DUMP/now.json; then deletes the line of the last finding and writes
-- after.json, with the text in edited.joule.
local folder = os.getenv('INKJOULE_DUMP')

local function read_json(path)
  local file = assert(io.open(path))
  local text = file:read('*a')
  file:close()
  return vim.json.decode(text)
end

local function write(name, text)
  local file = assert(io.open(folder .. '/' .. name, 'w'))
  file:write(text)
  file:close()
end

local grades = { 'error', 'caution', 'advice', 'advice' }

local function diagnostics()
  return vim.tbl_map(function(d)
    local lsp = (d.user_data or {}).lsp or {}
    return {
      line = d.lnum + 1, column = d.col + 1, endLine = d.end_lnum + 1, endColumn = d.end_col + 1,
      rule = d.code or lsp.code, severity = grades[d.severity], message = d.message,
    }
  end, vim.diagnostic.get(0))
end

local function hints()
  local out = {}
  if vim.lsp.inlay_hint and vim.lsp.inlay_hint.get then
    for _, hint in ipairs(vim.lsp.inlay_hint.get { bufnr = 0 }) do
      local label = hint.inlay_hint.label
      if type(label) == 'table' then label = table.concat(vim.tbl_map(function(p) return p.value end, label)) end
      table.insert(out, { line = hint.inlay_hint.position.line + 1, text = label })
    end
    return out
  end
  for _, mark in ipairs(vim.api.nvim_buf_get_extmarks(0, require('inkjoule').namespace, 0, -1, { details = true })) do
    table.insert(out, { line = mark[2] + 1, text = mark[4].virt_text[1][1] })
  end
  return out
end

local function request(method, params)
  local replies = vim.lsp.buf_request_sync(0, method, params, 5000) or {}
  for _, reply in pairs(replies) do
    if reply.result then return reply.result end
  end
end

local function hovers(review)
  local out = {}
  for _, value in ipairs(review.values) do
    local line = vim.api.nvim_buf_get_lines(0, value.line - 1, value.line, true)[1]
    local at = line:find(value.name, 1, true)
    if at then
      vim.api.nvim_win_set_cursor(0, { value.line, at - 1 })
      local result = request('textDocument/hover', vim.lsp.util.make_position_params())
      local text = result and table.concat(vim.lsp.util.convert_input_to_markdown_lines(result.contents), '\n') or ''
      table.insert(out, { name = value.name, text = text })
    end
  end
  return out
end

-- Waits until the condition holds and nothing has changed for half a second.
local function settle(holds)
  local last, since = '', vim.loop.now()
  vim.wait(15000, function()
    local now = vim.json.encode { diagnostics(), hints() }
    if now ~= last then last, since = now, vim.loop.now() end
    return holds() and vim.loop.now() - since > 500
  end, 50)
end

local function dump(name, more)
  local out = { columns = 'utf-8', diagnostics = diagnostics(), hints = hints() }
  write(name, vim.json.encode(vim.tbl_extend('force', out, more or {})))
end

local function main()
  local review = read_json(os.getenv('INKJOULE_REVIEW')).notes[1]
  settle(function() return #vim.diagnostic.get(0) > 0 end)
  dump('now.json', { hovers = hovers(review), filetype = vim.bo.filetype, version = tostring(vim.version().minor) })

  local before = #vim.diagnostic.get(0)
  local line = review.findings[#review.findings].line
  vim.api.nvim_buf_set_lines(0, line - 1, line, true, {})
  settle(function() return #vim.diagnostic.get(0) ~= before end)
  dump('after.json')
  write('edited.joule', table.concat(vim.api.nvim_buf_get_lines(0, 0, -1, true), '\n') .. '\n')
end

local good, err = pcall(main)
if not good then write('error.txt', tostring(err)) end
vim.cmd('qa!')
