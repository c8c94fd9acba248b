[
  (block)
  (rows)
  (chain)
] @fold
