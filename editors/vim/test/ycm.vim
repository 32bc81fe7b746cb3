" Vim with YouCompleteMe, set up as ../README.md says.
set nocompatible encoding=utf-8 noswapfile hidden
let s:test = expand('<sfile>:p:h')
execute 'set runtimepath^=' . fnameescape(fnamemodify(s:test, ':h'))
filetype plugin on
syntax on
let g:ycm_language_server = [{'name': 'inkjoule', 'cmdline': [$INKJOULE, 'serve'], 'filetypes': ['joule'], 'project_root_files': ['inkjoule.toml', '.git']}]
let g:ycm_enable_inlay_hints = 1
let g:ycm_server_python_interpreter = '/usr/bin/python3'
let g:ycm_echo_current_diagnostic = 'virtual-text'
let g:ycm_confirm_extra_conf = 0
packadd youcompleteme
set laststatus=2

if empty($INKJOULE_DUMP)
  finish
endif
execute 'source ' . s:test . '/dump.vim'

let s:ycm = {}

python3 << PYTHON
def inkjoule_diagnostics():
    """The diagnostics that YouCompleteMe holds for the buffer: byte columns, from 1."""
    grades = {'ERROR': 'error', 'WARNING': 'caution', 'INFORMATION': 'advice', 'HINT': 'advice'}
    out = []
    for d in ycm_state.CurrentBuffer()._diag_interface._diagnostics:
        start, end = d['location_extent']['start'], d['location_extent']['end']
        out.append({'line': start['line_num'], 'column': start['column_num'],
                    'endLine': end['line_num'], 'endColumn': end['column_num'],
                    'severity': grades[d['kind']], 'text': d['text']})
    return out

def inkjoule_hints():
    hints = ycm_state.CurrentBuffer().inlay_hints
    return [{'line': h['position']['line_num'], 'text': h['label']}
            for h in (getattr(hints, '_latest_inlay_hints', None) or getattr(hints, '_latest_response', None) or [])]
PYTHON

" The rule stands at the end of YouCompleteMe's text, in brackets.
function! s:ycm.Diagnostics() abort
  let l:list = py3eval('inkjoule_diagnostics()')
  for l:d in l:list
    let l:d.rule = matchstr(l:d.text, '\[\zs[a-z-]\+\ze\]\s*$')
    let l:d.message = remove(l:d, 'text')
  endfor
  return l:list
endfunction

function! s:ycm.Hints() abort
  return py3eval('inkjoule_hints()')
endfunction

function! s:ycm.Hover() abort
  return youcompleteme#GetCommandResponse('GetHover')
endfunction

autocmd VimEnter * call timer_start(200, {-> DumpNote(s:ycm, 'utf-8')})
