autocmd BufRead,BufNewFile *.span setfiletype span
