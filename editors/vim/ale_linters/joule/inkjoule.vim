" ALE finds this file by itself once the folder is in the runtime path.
call ale#Set('joule_inkjoule_executable', 'inkjoule')

" The folder that holds the note's configuration, else its repository, else its own.
function! s:Root(buffer) abort
  let l:config = ale#path#FindNearestFile(a:buffer, 'inkjoule.toml')
  if !empty(l:config)
    return fnamemodify(l:config, ':h')
  endif
  let l:git = ale#path#FindNearestDirectory(a:buffer, '.git')
  return !empty(l:git) ? fnamemodify(l:git, ':h:h') : expand('#' . a:buffer . ':p:h')
endfunction

call ale#linter#Define('joule', {
\   'name': 'inkjoule',
\   'lsp': 'stdio',
\   'executable': {buffer -> ale#Var(buffer, 'joule_inkjoule_executable')},
\   'command': '%e serve',
\   'project_root': function('s:Root'),
\})
