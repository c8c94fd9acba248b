(let "let" @context name: (name) @name) @item
(part role: (role) @context name: (name) @name) @item
(variant role: (role) @context name: (name) @name) @item
(drive "drive" @context name: (name) @name) @item
(case "case" @context name: (name) @name) @item
(require "require" @context clause: (string) @name) @item
