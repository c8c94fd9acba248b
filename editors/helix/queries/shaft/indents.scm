[
  (block)
  (rows)
  (parenthesized)
  (call)
  (group)
  (head)
  (chain)
] @indent

[
  "}"
  ")"
] @outdent
