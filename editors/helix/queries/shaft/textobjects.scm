; mif, maf: the fields of a part, a part with its fields.
(part (block (_)* @function.inside)) @function.around
(variant (block (_)* @function.inside)) @function.around
(drive) @class.around
(case) @class.around
[ (comment) (documentation) ] @comment.inside
(comment)+ @comment.around
(documentation)+ @comment.around
(entry value: (_) @parameter.inside) @parameter.around
