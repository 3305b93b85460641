-- The set-up of editors/neovim as an engineer has it, with the program to test.
local here = vim.fn.fnamemodify(debug.getinfo(1, "S").source:sub(2), ":p:h")
vim.opt.runtimepath:append(here .. "/../../neovim")
vim.opt.runtimepath:append(here .. "/../../vim")
vim.cmd("filetype plugin on")
vim.cmd("syntax on")
vim.g.mapleader = ","
require("spanwright").setup({ cmd = { vim.env.SPANWRIGHT, "serve" } })

-- The text of the floating window, or "".
function Floating()
  for _, window in ipairs(vim.api.nvim_list_wins()) do
    if vim.api.nvim_win_get_config(window).relative ~= "" then
      return table.concat(vim.api.nvim_buf_get_lines(vim.api.nvim_win_get_buf(window), 0, -1, false), "\n")
    end
  end
  return ""
end

function CloseFloating()
  for _, window in ipairs(vim.api.nvim_list_wins()) do
    if vim.api.nvim_win_get_config(window).relative ~= "" then
      vim.api.nvim_win_close(window, true)
    end
  end
end

-- The names of the messages, in order.
function Messages()
  local names = {}
  for _, d in ipairs(vim.diagnostic.get(0)) do
    table.insert(names, d.code or (d.user_data and d.user_data.lsp and d.user_data.lsp.code) or d.message)
  end
  return table.concat(names, " ")
end

function Ready()
  local clients = vim.lsp.buf_get_clients and vim.lsp.buf_get_clients(0) or vim.lsp.get_clients({ bufnr = 0 })
  for _, client in pairs(clients) do
    if client.initialized then
      return 1
    end
  end
  return 0
end
