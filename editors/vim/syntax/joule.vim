" Colours of a Joule note: prose, and calculation that stands four columns in.
if exists('b:current_syntax')
  finish
endif

let s:cpo = &cpo
set cpo&vim

" --- Calculation. A line indented by four columns that follows a blank line,
" the start or another such line; everything else is prose.
syn match jouleCalculation /^\%( \{4}\| \{0,3}\t\)\s*\S.*$/ contains=@jouleParts
syn cluster jouleParts contains=jouleStatement,jouleRegime,jouleRule,jouleDefined,jouleKind,jouleClause,jouleNumber,jouleAfterParen,jouleBlank,jouleText,jouleRemark,jouleFunction,jouleShape,jouleConstant,jouleOperator,jouleAdjectives,jouleBracket

syn match jouleDefined /^\s*\zs\a\%(\k\)*\ze\%(([^()=]*)\)\=\%(\s\+in\s\+[[:keyword:].]\+\)\=\s*\%(,[^=<>#"(),]*\)\=\%(=\)/ contained
syn match jouleDefined /^\s*\zs[^\x00-\x7f]\k*\ze\%(([^()=]*)\)\=\%(\s\+in\s\+[[:keyword:].]\+\)\=\s*\%(,[^=<>#"(),]*\)\=\%(=\)/ contained
syn match jouleKind /,\zs[^=<>#"(),]*\ze=/ contained contains=jouleQualifier
syn keyword jouleQualifier static instantaneous peak rms average contained
syn match jouleQualifier /\<peak-to-peak\>/ contained

syn match jouleStatement /^\s*\zs\%(medium\|region\|table\|uses\|regime\|plot\|assume\|criterion\|check\|safety\|waive\)\>\ze\%(\s*[=(,]\)\@!/ contained
syn match jouleAdjectives /\%(^\s*medium\s\+\k\+\s*:\)\@<=[^#"]*/ contained
syn match jouleRegime /\%(^\s*regime\s*:\s*\)\@<=\%(static\|harmonic\|transient\)\>/ contained
syn match jouleRule /\%(^\s*waive\s\+\)\@<=[[:alnum:]-]\+/ contained
syn keyword jouleClause for from to in over at per as contained

" A number, its standard uncertainty, and the unit phrase, which has no blanks inside.
syn match jouleNumber /\k\@1<!\d\+\%(\.\d\+\)\=\%([eE][-+−]\=\d\+\)\=\%((\d\+\%(\.\d\+\)\=)\)\=\%([eE][-+−]\=\d\+\)\=/ contained nextgroup=jouleUnit,jouleDegree
syn match jouleDegree /°/ contained
syn match jouleUnit /\s\+\%(\%(medium\|region\|table\|uses\|regime\|plot\|assume\|criterion\|check\|safety\|waive\|for\|from\|to\|over\|at\|per\|as\|j\|pi\)\>\)\@!\%(dB([^)[:blank:]]*)\|[[:alpha:]%°µμΩÅ℃]\+\)\%(\^-\=\d\+\|\^([^)[:blank:]]*)\|[⁻²³¹⁰⁴⁵⁶⁷⁸⁹]\+\)\=\%([·⋅./]\%([[:alpha:]%°µμΩÅ℃]\+\%(\^-\=\d\+\|\^([^)[:blank:]]*)\|[⁻²³¹⁰⁴⁵⁶⁷⁸⁹]\+\)\=\|([[:alpha:]%°µμΩÅ℃][^()[:blank:]]*\%(([^()[:blank:]]*)\)\=)\)\)*/ contained
syn match jouleAfterParen /)\@1<=\s\+\%(\%(for\|from\|to\|in\|over\|at\|per\|as\|j\|pi\)\>\)\@![[:alpha:]%°µμΩÅ℃][^[:blank:]#"=,()+*<>|]*\%(([^()[:blank:]]*)\)\=/ contained
syn match jouleBracket /\[[^][:blank:]]*\]/ contained
syn match jouleBlank /\k\@1<!__\k\@!/ contained nextgroup=jouleUnit

syn match jouleFunction /\<\%(sqrt\|cbrt\|exp\|ln\|log10\|sin\|cos\|tan\|asin\|acos\|atan\|atan2\|sinh\|cosh\|tanh\|abs\|min\|max\|sum\|mean\|dot\|cross\|Re\|Im\|conj\|arg\|diag\|tensor\|uniaxial\|rotate\|inv\|trace\|det\|ellipK\|ellipE\|besselJ\|besselY\|erf\|awg\|lower\|upper\|integral\|loop\|derivative\|solve\|assembly_energy\|potential\)\ze(/ contained
syn match jouleShape /\<\%(box\|ball\|shell\|cylinder\|tube\|rectangle\|disc\|sphere\|wall\|segment\|ring\)\ze(/ contained
syn match jouleConstant /\<\%(eps_0\|epsilon_0\|ε_0\|ε₀\|mu_0\|μ_0\|µ_0\|μ₀\|µ₀\|c_0\|c₀\|Z_0\|Z₀\|q_e\|m_e\|m_p\|k_B\|N_A\|h_planck\|hbar\|sigma_SB\|σ_SB\|g_n\|pi\|π\|j\|inf\)\>/ contained
syn match jouleOperator /[-+*/^·⋅×−±=<>≤≥≪≫|]/ contained

syn region jouleText start=/"/ end=/"/ end=/$/ oneline contained
syn match jouleRemark /#.*$/ contained

" --- Prose. A paragraph runs to the next blank line, so that indented lines in
" it are prose too; lists, quotes, tables and fenced blocks are never calculation.
syn match jouleProse /^ \{0,3}[^[:blank:]].*\%(\n\s*\S.*\)*$/ contains=jouleHeading,jouleUnderline,jouleCode
syn match jouleProse /^\s\+\%([-*>+]\s\||\).*\%(\n\s*\S.*\)*$/ contains=jouleCode
syn match jouleHeading /^ \{0,3}#\{1,6}\s.*$/ contained
syn match jouleUnderline /^ \{0,3}\%(=\{2,}\|-\{2,}\)\s*$/ contained
syn match jouleCode /`[^`]\+`/ contained
syn region jouleFence start=/^\s*\z(`\{3,}\|\~\{3,}\).*$/ end=/^\s*\z1[`~]*\s*$/ keepend

syn sync minlines=200

hi def link jouleStatement Statement
hi def link jouleClause    Keyword
hi def link jouleDefined   Identifier
hi def link jouleKind      Type
hi def link jouleQualifier StorageClass
hi def link jouleAdjectives StorageClass
hi def link jouleRegime    StorageClass
hi def link jouleRule      Tag
hi def link jouleNumber    Number
hi def link jouleUnit      Special
hi def link jouleAfterParen Special
hi def link jouleDegree    Special
hi def link jouleBracket   Special
hi def link jouleBlank     Todo
hi def link jouleText      String
hi def link jouleRemark    Comment
hi def link jouleFunction  Function
hi def link jouleShape     Function
hi def link jouleConstant  Constant
hi def link jouleOperator  Operator
hi def link jouleHeading   Title
hi def link jouleCode      Special
hi def link jouleUnderline Comment
hi def link jouleFence     Special

let b:current_syntax = 'joule'
let &cpo = s:cpo
unlet s:cpo
