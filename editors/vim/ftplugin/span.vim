" Plugin-free set-up for .span models: formatting, checking, comments.
if exists('b:did_ftplugin')
  finish
endif
let b:did_ftplugin = 1

setlocal commentstring=#\ %s comments=:#
setlocal expandtab shiftwidth=4 softtabstop=4
" gq, and gggqG for the whole file, write the normal form.
if executable('spanwright')
  let &l:formatprg = 'spanwright format -'
endif
compiler spanwright

let b:undo_ftplugin = 'setlocal commentstring< comments< expandtab< shiftwidth< softtabstop< formatprg< makeprg< errorformat<'
