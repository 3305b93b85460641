" Vim and Neovim syntax for .span models.
if exists('b:current_syntax')
  finish
endif
let b:current_syntax = 'span'
syntax case match

syntax match spanKeyword '^\s*\zs\%(model\|show\|let\|material\|section\|node\|beam\|bar\|link\|spring\|support\|mass\|group\|case\|alternate\|combination\|family\|limit\|use\|part\|place\)\>' nextgroup=spanName skipwhite
syntax match spanName '\<[[:alpha:]_][[:alnum:]_.]*\ze\s*\%([=(]\|by\>\)' contained
syntax keyword spanWord of at to from by under over on or about along across down up local only
syntax keyword spanOption plane space fixed pinned holds hinge release joint roll offset turned tension compression plan elevation pretension inertia gravity
syntax match spanOption '\<\%(second order\|shear flexible\)\>'
syntax keyword spanKind permanent imposed snow wind thermal settlement accidental earthquake
syntax keyword spanCode EN1990 ASCE7 strength characteristic frequent allowable
syntax match spanCode '\<quasi-permanent\>'
syntax match spanLoad '\<self-weight\>'
syntax keyword spanMeasure deflection drift stress axial shear moment reaction frequency ux uy uz rx ry rz Fx Fy Fz Mx My Mz
syntax match spanMeasure '\<critical factor\>'
syntax keyword spanConstant pi length yield
syntax match spanFunction '\<\%(sqrt\|abs\|min\|max\|sin\|cos\|tan\|asin\|acos\|atan\|atan2\|hypot\|floor\|ceil\|round\)\ze\s*('
syntax match spanNumber '\%([[:alnum:]_]\)\@1<!\%(\d\+\%(\.\d*\)\=\|\.\d\+\)\%([eE][-+]\=\d\+\)\=' nextgroup=spanUnit skipwhite
syntax match spanUnit '\%(\%(mm\|cm\|km\|m\|in\|ft\|yd\)[2-6²³⁴⁵⁶]\=\|kNm\|MNm\|Nm\|kN\|MN\|N\|lbf\|kipft\|kipin\|lbft\|kip\|GPa\|MPa\|kPa\|Pa\|psi\|ksi\|psf\|ksf\|plf\|klf\|kg\|lb\|t\|Hz\|s\|K\|mrad\|rad\|deg\)[[:alnum:]_]\@!\|%' contained
syntax match spanOperator '->\|<=\|>=\|[-+*/^=:·]'
syntax match spanComment '#.*$' contains=@Spell
syntax match spanText '"[^"]*"\=' contains=@Spell

highlight default link spanKeyword Statement
highlight default link spanName Identifier
highlight default link spanWord Keyword
highlight default link spanOption StorageClass
highlight default link spanKind Type
highlight default link spanCode Constant
highlight default link spanLoad Statement
highlight default link spanMeasure Type
highlight default link spanConstant Constant
highlight default link spanFunction Function
highlight default link spanNumber Number
highlight default link spanUnit Special
highlight default link spanOperator Operator
highlight default link spanComment Comment
highlight default link spanText String
