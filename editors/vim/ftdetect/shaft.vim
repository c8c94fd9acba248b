autocmd BufNewFile,BufRead *.shaft setfiletype shaft
