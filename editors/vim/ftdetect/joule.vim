" A Joule note, under either of its names. `set filetype` and not `setfiletype`:
" for NAME.joule.md the editor has decided on markdown by then.
autocmd BufNewFile,BufRead *.joule,*.joule.md set filetype=joule
