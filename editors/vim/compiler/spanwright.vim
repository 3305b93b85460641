" :make checks the model and fills the quickfix list.
let current_compiler = 'spanwright'
CompilerSet makeprg=spanwright\ check\ %:S
CompilerSet errorformat=%f:%l:%c:\ %trror:\ %m,%f:%l:%c:\ %tarning:\ %m,%f:%l:%c:\ %tnformation:\ %m,%f:%l:%c:\ %tint:\ %m
