-- Starts `spanwright serve` for .span buffers. Works from Neovim 0.7 on and
-- needs no plugin:
--
--   require("spanwright").setup()
--   require("spanwright").setup({ cmd = { "/opt/bin/spanwright", "serve" } })

local M = {}

-- One server serves all buffers of one root folder.
local clients = {}

local function root_of(path)
  local folder = vim.fn.fnamemodify(path, ":p:h")
  local git = vim.fn.finddir(".git", folder .. ";")
  if git ~= "" then
    return vim.fn.fnamemodify(git, ":p:h:h")
  end
  return folder
end

local function keys(buffer)
  local function map(key, action)
    vim.keymap.set("n", key, action, { buffer = buffer, silent = true })
  end
  map("K", vim.lsp.buf.hover)
  map("gd", vim.lsp.buf.definition)
  map("gr", vim.lsp.buf.references)
  map("<leader>rn", vim.lsp.buf.rename)
  map("<leader>ca", vim.lsp.buf.code_action)
  map("<leader>cl", vim.lsp.codelens.run)
  map("]d", vim.diagnostic.goto_next)
  map("[d", vim.diagnostic.goto_prev)
  map("<leader>f", function()
    if vim.lsp.buf.format then
      vim.lsp.buf.format()
    else
      vim.lsp.buf.formatting_sync(nil, 2000)
    end
  end)
end

local function attach(client, buffer)
  vim.bo[buffer].omnifunc = "v:lua.vim.lsp.omnifunc"
  vim.bo[buffer].commentstring = "# %s"
  keys(buffer)
  if vim.lsp.inlay_hint then
    vim.lsp.inlay_hint.enable(true, { bufnr = buffer })
  end
  if vim.lsp.codelens and client.server_capabilities.codeLensProvider then
    vim.api.nvim_create_autocmd({ "BufEnter", "InsertLeave", "TextChanged" }, {
      buffer = buffer,
      callback = function() vim.lsp.codelens.refresh() end,
    })
  end
  if M.options.on_attach then
    M.options.on_attach(client, buffer)
  end
end

local function start(buffer)
  local root = root_of(vim.api.nvim_buf_get_name(buffer))
  local id = clients[root]
  if not id or not vim.lsp.get_client_by_id(id) then
    id = vim.lsp.start_client({
      name = "spanwright",
      cmd = M.options.cmd,
      root_dir = root,
      workspace_folders = { { uri = vim.uri_from_fname(root), name = vim.fn.fnamemodify(root, ":t") } },
      settings = { spanwright = M.options.settings },
      on_attach = attach,
    })
    clients[root] = id
  end
  if id then
    vim.lsp.buf_attach_client(buffer, id)
  end
end

function M.setup(options)
  M.options = vim.tbl_deep_extend("force", { cmd = { "spanwright", "serve" }, settings = vim.empty_dict() }, options or {})
  vim.api.nvim_create_autocmd("FileType", {
    pattern = "span",
    group = vim.api.nvim_create_augroup("spanwright", { clear = true }),
    callback = function(event) start(event.buf) end,
  })
end

return M
