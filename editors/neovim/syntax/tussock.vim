" Tussock: verbs at the left margin, the words of clauses, names in back-quotes, live values.

if exists('b:current_syntax')
  finish
endif

syntax case match
syntax match tussockVerb /^\%(policy\|read\|admit\|derive\|levels\|label\|compare\|show\|write\|pin\)\>/
syntax keyword tussockWord alpha interval pairs scores effect missing sample as separator decimal encoding where because merging into unit better across in of for coefficients at within
syntax keyword tussockOperator and or not if then else
syntax match tussockNumber /\%(\k\|\.\)\@1<!\%(\d\+\%(\.\d*\)\=\|\.\d\+\)\%([eE][-+]\=\d\+\)\=%\=/
syntax region tussockName start=/`/ end=/`/ oneline
syntax region tussockValue start=/{{/ end=/}}/ contained
syntax region tussockText start=/"/ end=/"/ oneline contains=tussockValue
syntax region tussockText start=/"""/ end=/"""/ contains=tussockValue
syntax match tussockComment /#.*$/ contains=tussockAllow
syntax match tussockAllow /# \zsallow [a-z-]\+\ze:/ contained

highlight default link tussockVerb Statement
highlight default link tussockWord Keyword
highlight default link tussockOperator Operator
highlight default link tussockNumber Number
highlight default link tussockName Identifier
highlight default link tussockText String
highlight default link tussockValue Special
highlight default link tussockComment Comment
highlight default link tussockAllow SpecialComment

let b:current_syntax = 'tussock'
