" Looks at colours, indentation and what ALE gets from the server. Run by check.sh.
" usage: vim -N -u check.vim -i NONE -n -es --cmd 'let g:spec = "…"' --cmd 'let g:ale = "folder of ALE"'
"        --cmd 'let g:out = "…"'
set nocompatible encoding=utf-8
let g:here = expand('<sfile>:p:h')
execute 'set runtimepath^=' . g:ale . ',' . g:here
let g:ale_linters = {'shaft': ['layshaft']}
let g:ale_virtualtext_cursor = 'disabled'
let g:ale_set_loclist = 1
filetype plugin indent on
syntax on

let g:failed = 0
let g:said = []
function! Check(name, ok, ...) abort
  call add(g:said, (a:ok ? 'ok   ' : 'FAIL ') . a:name . (a:0 ? ': ' . strcharpart(substitute(a:1, '\n', ' ', 'g'), 0, 140) : ''))
  let g:failed += a:ok ? 0 : 1
endfunction

function! Wait(what) abort
  for l:turn in range(200)
    if eval(a:what)
      return 1
    endif
    sleep 100m
  endfor
  return 0
endfunction

" The innermost colour `ahead` bytes behind the start of a text.
function! Colour(text, ahead) abort
  call cursor(1, 1)
  let l:place = searchpos('\V' . escape(a:text, '\'), 'cW')
  let l:stack = synstack(l:place[0], l:place[1] + a:ahead)
  return empty(l:stack) ? '' : synIDattr(l:stack[-1], 'name')
endfunction

function! Run() abort
  execute 'edit' fnameescape(g:spec)
  call Check('file type', &filetype ==# 'shaft', &filetype)
  for [l:text, l:ahead, l:wanted] in [
        \ ['source motor', 0, 'shaftDeclaration'],
        \ ['induction_motor', 0, 'shaftKind'],
        \ ['let block_mass', 0, 'shaftDeclaration'],
        \ ['"order', 2, 'shaftString'],
        \ ['from "order', 0, 'shaftClause'],
        \ ['breakdown_torque', 0, 'shaftField'],
        \ ['2.9 × rated', 0, 'shaftNumber'],
        \ ['2.9 × rated', 7, 'shaftConstant'],
        \ ['kN·m', 0, 'shaftUnit'],
        \ ['only where', 0, 'shaftClause'],
        \ ['only where', 5, 'shaftClause'],
        \ ['S3 40', 0, 'shaftDuty'],
        \ ['lift.hook', 5, 'shaftMember'],
        \ ['peak-as', 0, 'shaftCode'],
        \ ['## Goods', 3, 'shaftDocumentation'],
        \ ['# By hand', 2, 'shaftComment'],
        \ ]
    let l:found = Colour(l:text, l:ahead)
    call Check('colour of `' . l:text . '` at ' . l:ahead, l:found ==# l:wanted, l:found)
  endfor
  let l:good = getline(1, '$')
  silent normal! gg=G
  call Check('indentation is that of the formatter', getline(1, '$') ==# l:good)
  if empty(g:ale)
    return
  endif
  doautocmd layshaft VimEnter
  call ale#Queue(0)
  sleep 3
  call Check('no findings in a good spec', empty(getloclist(0)), string(getloclist(0)))
  %substitute/= 60 kg /= 60 kgg /
  call ale#Queue(0)
  call Wait('!empty(getloclist(0))')
  let l:found = getloclist(0)
  call Check('a broken unit is told', !empty(l:found), empty(l:found) ? '' : l:found[0].text)
  call Check('one mistake, one message', len(l:found) == 1, string(len(l:found)))
  %substitute/= 60 kgg /= 60 kg /
  call ale#Queue(0)
  call Check('gone when mended', Wait('empty(getloclist(0))'))
  call cursor(1, 1)
  call search('lift = motor')
  ALEHover
  call Wait('len(filter(range(1, winnr("$")), "getwinvar(v:val, \"&previewwindow\")")) > 0')
  let l:windows = filter(range(1, winnr('$')), 'getwinvar(v:val, "&previewwindow")')
  let l:hover = empty(l:windows) ? '' : join(getbufline(winbufnr(l:windows[0]), 1, '$'), "\n")
  call Check('hover has the numbers', l:hover =~# '1447 rpm', l:hover)
  call search('block_mass;')
  ALEGoToDefinition
  call Check('definition', Wait('getline(".") =~# "^let block_mass"'), getline('.'))
endfunction

function! Start() abort
  try
    call Run()
  catch
    call Check('no error', 0, v:exception . ' at ' . v:throwpoint)
  endtry
  call writefile(add(g:said, g:failed . ' failed'), g:out)
  execute g:failed ? 'cquit!' : 'qall!'
endfunction
autocmd VimEnter * ++nested call Start()
