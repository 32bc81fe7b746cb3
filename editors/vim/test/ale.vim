" Vim with ALE, set up as ../README.md says.
set nocompatible encoding=utf-8 noswapfile hidden
let s:test = expand('<sfile>:p:h')
execute 'set runtimepath^=' . fnameescape(fnamemodify(s:test, ':h'))
filetype plugin on
syntax on
let g:ale_joule_inkjoule_executable = $INKJOULE
packadd ale
set laststatus=2

if empty($INKJOULE_DUMP)
  finish
endif
execute 'source ' . s:test . '/dump.vim'
let g:ale_lint_delay = 50
let g:ale_hover_to_preview = 1

let s:ale = {}

" ALE takes the server's UTF-16 columns as they are; its ends are inclusive, and
" it shows advice as a warning.
function! s:ale.Diagnostics() abort
  let l:grades = {'E': 'error', 'W': 'caution or advice'}
  return map(copy(get(get(g:ale_buffer_info, bufnr('%'), {}), 'loclist', [])), {_, d -> {
  \   'line': d.lnum, 'column': d.col, 'endLine': d.end_lnum, 'endColumn': d.end_col + 1,
  \   'rule': get(d, 'code', ''), 'severity': l:grades[d.type], 'message': get(d, 'detail', d.text)}})
endfunction

function! s:ale.Hover() abort
  silent! pclose!
  ALEHover
  for l:n in range(40)
    sleep 50m
    for l:window in range(1, winnr('$'))
      if getwinvar(l:window, '&previewwindow')
        let l:text = join(getbufline(winbufnr(l:window), 1, '$'), "\n")
        pclose!
        return l:text
      endif
    endfor
  endfor
  return ''
endfunction

autocmd VimEnter * call timer_start(200, {-> DumpNote(s:ale, 'utf-16')})
