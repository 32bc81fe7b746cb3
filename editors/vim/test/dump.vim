" What the two Vim tests share: they wait, dump what Vim shows of the note to
" $INKJOULE_DUMP/now.json, delete the line of the last finding, and dump again to
" after.json with the text in edited.joule. A test gives a dictionary of functions:
" Diagnostics(), Hints() (or none, where the plugin shows none), Hover().
let s:review = json_decode(join(readfile($INKJOULE_REVIEW), "\n")).notes[0]

function! s:Write(name, value) abort
  call writefile([json_encode(a:value)], $INKJOULE_DUMP . '/' . a:name)
endfunction

" Waits until there are diagnostics unlike those before, and all is still.
function! s:Settle(plugin, before) abort
  let [l:last, l:still] = ['', 0]
  for l:n in range(300)
    sleep 50m
    let l:list = a:plugin.Diagnostics()
    let l:now = json_encode([l:list, has_key(a:plugin, 'Hints') ? a:plugin.Hints() : []])
    let l:still = l:now ==# l:last ? l:still + 1 : 0
    let l:last = l:now
    if l:list != a:before && l:still > 20
      return
    endif
  endfor
endfunction

function! s:Dump(plugin, columns) abort
  let l:out = {'columns': a:columns, 'diagnostics': a:plugin.Diagnostics()}
  if has_key(a:plugin, 'Hints')
    let l:out.hints = a:plugin.Hints()
  endif
  return l:out
endfunction

function! s:Hovers(plugin) abort
  let l:out = []
  for l:value in s:review.values
    let l:at = stridx(getline(l:value.line), l:value.name)
    if l:at >= 0
      call cursor(l:value.line, l:at + 1)
      call add(l:out, {'name': l:value.name, 'text': a:plugin.Hover()})
    endif
  endfor
  return l:out
endfunction

function! DumpNote(plugin, columns) abort
  try
    call s:Settle(a:plugin, [])
    let l:now = s:Dump(a:plugin, a:columns)
    let l:now.hovers = s:Hovers(a:plugin)
    let l:now.filetype = &filetype
    call s:Write('now.json', l:now)
    execute s:review.findings[-1].line . 'delete _'
    doautocmd TextChanged
    call s:Settle(a:plugin, l:now.diagnostics)
    call writefile(getline(1, '$'), $INKJOULE_DUMP . '/edited.joule')
    call s:Write('after.json', s:Dump(a:plugin, a:columns))
  catch
    call writefile([v:exception, v:throwpoint], $INKJOULE_DUMP . '/error.txt')
  endtry
  call writefile([], $INKJOULE_DUMP . '/done')
endfunction
