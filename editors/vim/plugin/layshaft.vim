" The language server, for whichever client is there: ALE, vim-lsp or yegappan/lsp. coc.nvim reads its own settings,
" see the README. The command is g:layshaft_command, a list.
if exists('g:loaded_layshaft')
  finish
endif
let g:loaded_layshaft = 1
let g:layshaft_command = get(g:, 'layshaft_command', ['layshaft', 'lsp'])

" The nearest folder above with a layshaft.toml, else the file's own.
function! LayshaftRoot(buffer) abort
  let l:file = fnamemodify(bufname(a:buffer), ':p')
  let l:found = findfile('layshaft.toml', fnamemodify(l:file, ':h') . ';')
  return fnamemodify(empty(l:found) ? l:file : l:found, ':p:h')
endfunction

function! s:ale() abort
  call ale#linter#Define('shaft', {
        \ 'name': 'layshaft',
        \ 'lsp': 'stdio',
        \ 'executable': g:layshaft_command[0],
        \ 'command': join(['%e'] + map(copy(g:layshaft_command[1:]), 'shellescape(v:val)')),
        \ 'project_root': function('LayshaftRoot'),
        \ 'language': 'shaft',
        \ })
endfunction

function! s:vim_lsp() abort
  call lsp#register_server({
        \ 'name': 'layshaft',
        \ 'cmd': {info -> g:layshaft_command},
        \ 'allowlist': ['shaft'],
        \ 'languageId': {info -> 'shaft'},
        \ 'root_uri': {info -> lsp#utils#path_to_uri(LayshaftRoot(bufnr('%')))},
        \ })
endfunction

function! s:yegappan() abort
  call LspAddServer([#{
        \ name: 'layshaft',
        \ filetype: ['shaft'],
        \ path: g:layshaft_command[0],
        \ args: g:layshaft_command[1:],
        \ rootSearch: ['layshaft.toml'],
        \ languageId: {filetype -> 'shaft'},
        \ }])
endfunction

augroup layshaft
  autocmd!
  autocmd VimEnter * if exists('g:loaded_ale') | call s:ale() | endif
  autocmd User lsp_setup call s:vim_lsp()
  autocmd User LspSetup call s:yegappan()
augroup END
