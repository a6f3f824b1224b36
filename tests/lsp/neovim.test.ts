/** Another editor's own client attached to `lyate serve --stdio`: findings come, and go with an edit. */
import { execFileSync, spawnSync } from 'node:child_process';
import { mkdtempSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { expect, it } from 'vitest';
import { bundle } from './client.ts';

const PLAN = `compound K = O=C([CH3:1])c1ccccc1
step A
  solvent water 30 mL
  charge K 10 mmol
  base NaOH 1.1 equiv
  deprotonate K at :1
`;
const hasNeovim = spawnSync('nvim', ['--version']).status === 0;

/** What the editor says after it has seen the plan, and after its fourth line has become a stronger base in THF. */
const script = (plan: string, server: string) => `
vim.cmd('edit ${plan}')
local client = vim.lsp.start_client({ name = 'lyate', cmd = { '${process.execPath}', '${server}', 'serve', '--stdio' }, root_dir = '${tmpdir()}' })
vim.lsp.buf_attach_client(0, client)
local function said() local all = {} for _, each in ipairs(vim.diagnostic.get(0)) do table.insert(all, each.code .. '@' .. each.lnum .. ':' .. each.col) end return table.concat(all, ' ') end
vim.wait(15000, function() return #vim.diagnostic.get(0) > 0 end, 20)
io.stdout:write('first ' .. said() .. '\\n')
vim.api.nvim_buf_set_text(0, 2, 10, 2, 15, { 'THF' })
vim.api.nvim_buf_set_text(0, 4, 7, 4, 11, { 'LDA' })
vim.wait(15000, function() return #vim.diagnostic.get(0) == 0 end, 20)
io.stdout:write('then ' .. said() .. '\\n')
vim.lsp.stop_client(client)
vim.cmd('qall!')
`;

it.runIf(hasNeovim)('Neovim shows the finding at its place and drops it when it is mended', async () => {
  const folder = mkdtempSync(join(tmpdir(), 'lyate-neovim-'));
  const server = resolve(await bundle('server/src/cli/main.ts', '.cache/tests/lyate-neovim.cjs'));
  const [plan, lua] = [join(folder, 'plan.lyate'), join(folder, 'look.lua')];
  writeFileSync(plan, PLAN);
  writeFileSync(lua, script(plan, server));
  const output = execFileSync('nvim', ['--headless', '-u', 'NONE', '-n', '-c', `luafile ${lua}`], {
    encoding: 'utf8',
    timeout: 60_000,
  });
  expect(output).toContain('first transfer-uphill@5:19\n');
  expect(output).toMatch(/then \n/);
});
