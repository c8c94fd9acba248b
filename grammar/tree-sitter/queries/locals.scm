; What a spec declares, and where it is used. The order of declarations does not matter: a file is one scope.
(file) @local.scope

(let name: (name) @local.definition.constant)
(part name: (name) @local.definition.var)
(variant name: (name) @local.definition.var)
(drive name: (name) @local.definition.namespace)
(case name: (name) @local.definition.label)
(use name: (name) @local.definition.import)

(path . (name) @local.reference)
(case of: (name) @local.reference)
(case_name name: (name) @local.reference)
