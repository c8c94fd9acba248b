(block "}" @end) @indent
(rows "}" @end) @indent
(parenthesized ")" @end) @indent
(call ")" @end) @indent
