" Checks the colours: vim -Nu NONE -n -es -S syntax.vim, in this folder's parent's
" runtime path. A case is a line of the note, a text in it, and the group that the
" text must have ('' for prose). Results go to $INKJOULE_DUMP/syntax.txt.
set nocompatible encoding=utf-8
execute 'set runtimepath^=' . fnameescape(expand('<sfile>:p:h:h'))
syntax on
filetype plugin on

let s:cases = [
  \ ['    U, peak voltage = 12.0(1) kV   per "a # b"', [['U', 'jouleDefined'], ['peak', 'jouleQualifier'], ['voltage', 'jouleKind'],
  \     ['12.0(1)', 'jouleNumber'], ['kV', 'jouleUnit'], ['per', 'jouleClause'], ['"a # b"', 'jouleText']]],
  \ ['    τ = R*C   # remark', [['τ', 'jouleDefined'], ['*', 'jouleOperator'], ['# remark', 'jouleRemark']]],
  \ ['    Q = 2 nC*V1', [['nC', 'jouleUnit'], ['*', 'jouleOperator']]],
  \ ['    k = 5 W/(m^2·K) for f from 50 Hz to 1 MHz', [['W/(m^2·K)', 'jouleUnit'], ['for', 'jouleClause'], ['to', 'jouleClause'], ['MHz', 'jouleUnit']]],
  \ ['    W = integral(w over disc) = __ mJ', [['integral', 'jouleFunction'], ['over', 'jouleClause'], ['__', 'jouleBlank'], ['mJ', 'jouleUnit']]],
  \ ['    F = Q^2/(4*pi*eps_0*r^2)', [['pi', 'jouleConstant'], ['eps_0', 'jouleConstant']]],
  \ ['    medium mica: linear, lossy', [['medium', 'jouleStatement'], ['linear', 'jouleAdjectives']]],
  \ ['    regime: harmonic at f = 50 Hz', [['regime', 'jouleStatement'], ['harmonic', 'jouleRegime']]],
  \ ['    waive scalar-permittivity for w: "plane"', [['waive', 'jouleStatement'], ['scalar-permittivity', 'jouleRule']]],
  \ ['    region disc in mica: cylinder(R, d)', [['region', 'jouleStatement'], ['cylinder', 'jouleShape']]],
  \ ['    criterion |E| <= 3 kV/mm', [['criterion', 'jouleStatement'], ['<', 'jouleOperator'], ['kV/mm', 'jouleUnit']]],
  \ ['    E = (0, 0, 4) kV/mm  for x', [['kV/mm', 'jouleAfterParen'], ['for', 'jouleClause']]],
  \ ['    check_1 = 3', [['check_1', 'jouleDefined']]],
  \ ['A flush line: U = 3 kV', [['U', 'jouleProse'], ['kV', 'jouleProse']]],
  \ ["Prose\n    indented: W = 3 J", [['W', 'jouleProse'], ['J', 'jouleProse']]],
  \ ['    - a list, W = 3 J', [['W', 'jouleProse']]],
  \ ["```\n    W = 3 J\n```", [['W', 'jouleFence']]],
  \ ]

let s:out = []
for [s:text, s:wanted] in s:cases
  enew!
  call setline(1, split(s:text, "\n"))
  set filetype=joule
  let s:line = s:text =~ "\n" ? 2 : 1
  for [s:part, s:group] in s:wanted
    let s:at = stridx(getline(s:line), s:part)
    for s:col in [s:at + 1, s:at + strlen(s:part)]
      let s:has = synIDattr(synID(s:line, s:col, 1), 'name')
      let s:good = s:has ==# s:group
      call add(s:out, (s:good ? 'ok    ' : 'FAIL  ') . 'Vim syntax: ' . s:part . ' in "' . getline(s:line) . '" is ' . s:group
        \ . (s:good ? '' : ', not ' . s:has))
    endfor
  endfor
endfor
call writefile(uniq(s:out), $INKJOULE_DUMP . '/syntax.txt')
qall!
