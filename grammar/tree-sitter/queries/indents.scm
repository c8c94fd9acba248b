[
  (block)
  (rows)
  (parenthesized)
  (call)
  (group)
  (head)
  (chain)
] @indent.begin

"}" @indent.branch @indent.end
")" @indent.branch

; A line of a chain is one step in, however many there are.
(chain "->" @indent.auto)
[
  (comment)
  (documentation)
  (string)
] @indent.auto
