(file) @local.scope

(let name: (name) @local.definition.constant)
(part name: (name) @local.definition.variable)
(variant name: (name) @local.definition.variable)
(drive name: (name) @local.definition.namespace)

(path . (name) @local.reference)
