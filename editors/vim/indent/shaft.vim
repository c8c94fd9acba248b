" Indentation of specs: by brackets, and one step for a line that goes on.
if exists('b:did_indent')
  finish
endif
let b:did_indent = 1

setlocal indentexpr=ShaftIndent(v:lnum)
setlocal indentkeys=0},0),0],o,O,!^F
let b:undo_indent = 'setlocal indentexpr< indentkeys<'

if exists('*ShaftIndent')
  finish
endif

" A line without its comment; a # inside of a text is none.
function! s:code(lnum) abort
  return substitute(getline(a:lnum), '\v^(%([^"#]|"[^"]*")*)#.*$', '\1', '')
endfunction

" How many brackets a line leaves open: below zero where it closes more.
function! s:opened(code) abort
  let l:bare = substitute(a:code, '"[^"]*"\?', '', 'g')
  let l:depth = 0
  for l:sign in split(l:bare, '\zs')
    let l:depth += l:sign =~# '[[({]' ? 1 : l:sign =~# '[])}]' ? -1 : 0
  endfor
  return l:depth
endfunction

function! s:goes_on(lnum) abort
  let l:before = prevnonblank(a:lnum - 1)
  return getline(a:lnum) =~# '\v^\s*(-\>|→|%(only|from|measured|assumed|with|at|and|or|not|then|else|as|because)>)'
        \ || (l:before > 0 && s:code(l:before) =~# '\v([-+*/^=,×÷·±<>→]|\.\.|<%(and|or|not|if|then|else))\s*$')
endfunction

function! ShaftIndent(lnum) abort
  let l:before = prevnonblank(a:lnum - 1)
  if l:before == 0
    return 0
  endif
  let l:indent = indent(l:before)
  let l:opened = s:opened(s:code(l:before))
  if s:goes_on(l:before) && l:opened <= 0
    let l:indent -= shiftwidth()
  endif
  " A line that begins with the bracket it closes stands with the line that opened it already.
  if l:opened < 0 && getline(l:before) !~# '^\s*[])}]'
    let l:indent -= shiftwidth()
  elseif l:opened > 0
    let l:indent += shiftwidth()
  endif
  if getline(a:lnum) =~# '^\s*[])}]'
    let l:indent -= shiftwidth()
  elseif s:goes_on(a:lnum) && l:opened <= 0
    let l:indent += shiftwidth()
  endif
  return max([l:indent, 0])
endfunction
