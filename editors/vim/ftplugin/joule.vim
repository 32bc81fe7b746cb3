" Settings of a buffer that holds a Joule note.
if exists('b:did_ftplugin')
  finish
endif
let b:did_ftplugin = 1

" Calculation is what stands four columns in, so the Tab key moves by four and
" writes blanks; prose is wrapped by its author, calculation never.
setlocal expandtab shiftwidth=4 softtabstop=4 tabstop=4
setlocal textwidth=0
setlocal commentstring=#\ %s comments=:#

let b:undo_ftplugin = 'setlocal expandtab< shiftwidth< softtabstop< tabstop< textwidth< commentstring< comments<'
