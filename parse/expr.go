package parse

import (
	"math/big"
	"slices"
	"strings"
	"unicode/utf8"

	"github.com/alecthomas/participle/v2/lexer"

	"remnant/parse/diag"
)

// Expressions are parsed by precedence climbing: one method per level, sums loosest. An
// operator's bracket [u] stands at the level of products, because it closes all the
// factors before it that contain box. Lists of any length are flat, and what can only
// nest is bounded, so that the depth of the tree is bounded.

// fault is a diagnostic on its way through the statement grammar.
type fault struct{ diag.Diagnostic }

func (f *fault) Error() string { return f.Summary }

func newFault(kind diag.Kind, at diag.Span, summary, hint string) *fault {
	return &fault{diag.Diagnostic{Kind: kind, Span: at, Summary: summary, Hint: hint}}
}

// Parse reads a formula; it is called by the statement grammar.
func (f *Formula) Parse(lex *lexer.PeekingLexer) (err error) {
	f.X, err = parseExpr(lex, true, true)
	return err
}

// Parse reads an item of a list; it is called by the statement grammar.
func (i *Item) Parse(lex *lexer.PeekingLexer) (err error) {
	i.X, err = parseExpr(lex, false, true)
	return err
}

// exprParser reads one expression. Errors travel as panics of *fault, within this file.
type exprParser struct {
	lex       *lexer.PeekingLexer
	comma     bool // a comma differentiates here
	semicolon bool // a semicolon differentiates here
	depth     int
}

func parseExpr(lex *lexer.PeekingLexer, comma, semicolon bool) (x Expr, err error) {
	defer func() {
		switch v := recover().(type) {
		case nil:
		case *fault:
			err = v
		default:
			panic(v)
		}
	}()
	p := &exprParser{lex: lex, comma: comma, semicolon: semicolon}
	x = p.sum()
	p.noOperand(x)
	return x, nil
}

// noOperand refuses what would begin another operand: a product without its mark.
func (p *exprParser) noOperand(before Expr) {
	t := p.lex.Peek()
	if t.Type == tokenName || t.Type == tokenNumber || t.Type == tokenMark && (t.Value == "(" || t.Value == "√") {
		panic(newFault(diag.MissingMultiplication, tokenSpan(t),
			"'*' is missing before '"+t.Value+"'", "multiplication is written, as in 2*a"))
	}
	_, isNumber := lastOperand(before).(*Number)
	if isNumber && p.at("'") {
		panic(newFault(diag.PrimeOnNumber, tokenSpan(t), "a number has no time derivative",
			"to differentiate all of it, bracket it: (a^2)'"))
	}
}

// lastOperand returns the operand that ends where x ends.
func lastOperand(x Expr) Expr {
	for {
		switch n := x.(type) {
		case *Sum:
			x = n.Terms[len(n.Terms)-1].X
		case *Product:
			x = n.Factors[len(n.Factors)-1].X
		case *Sign:
			x = n.X
		case *Power:
			x = n.Exponent
		default:
			return x
		}
	}
}

func tokenSpan(t *lexer.Token) diag.Span {
	return diag.Span{Start: t.Pos.Offset, End: t.Pos.Offset + len(t.Value)}
}

// at reports whether the next token is the mark.
func (p *exprParser) at(mark string) bool {
	t := p.lex.Peek()
	return t.Type == tokenMark && canonicalMark(t.Value) == mark
}

func (p *exprParser) expect(mark, where string) diag.Span {
	if !p.at(mark) {
		p.unexpected("'" + mark + "' is expected " + where)
	}
	return tokenSpan(p.lex.Next())
}

// unexpected refuses the next token.
func (p *exprParser) unexpected(hint string) {
	t := p.lex.Peek()
	if t.EOF() {
		panic(newFault(diag.EndsEarly, diag.Span{Start: t.Pos.Offset, End: t.Pos.Offset}, "the expression ends too early", hint))
	}
	panic(newFault(diag.UnexpectedToken, tokenSpan(t), "'"+t.Value+"' cannot stand here", hint))
}

// enter counts nesting that no bracket shows.
func (p *exprParser) enter() {
	if p.depth++; p.depth > maxDepth {
		panic(newFault(diag.TooDeep, tokenSpan(p.lex.Peek()), "the expression is nested too deeply", "at most 1000 levels are read"))
	}
}

// sum = product { ("+" | "-") product }.
func (p *exprParser) sum() Expr {
	first := p.product()
	terms := []Summand{{X: first}}
	for p.at("+") || p.at("-") {
		minus := p.at("-")
		p.lex.Next()
		terms = append(terms, Summand{Minus: minus, X: p.product()})
	}
	if len(terms) == 1 {
		return first
	}
	return &Sum{node{first.Span().Join(terms[len(terms)-1].X.Span())}, terms}
}

// signed is a factor before its signs are wrapped around it: those of an operator's
// first factor must end up outside of what the operator makes.
type signed struct {
	over  bool
	signs []lexer.Token
	x     Expr
}

// product = signed { ("*" | "/") signed }, signed = { sign } power { target }.
func (p *exprParser) product() Expr {
	var factors []signed
	over := false
	for {
		f := signed{over: over, signs: p.signs()}
		f.x = p.power()
		factors = append(factors, f)
		for count := 0; p.at("["); count++ {
			if count == maxDepth {
				p.depth = maxDepth
				p.enter()
			}
			factors = p.target(factors)
		}
		if !p.at("*") && !p.at("/") {
			break
		}
		p.noOperand(f.x)
		over = p.at("/")
		p.lex.Next()
	}
	return joinFactors(factors)
}

func joinFactors(factors []signed) Expr {
	operands := make([]Operand, len(factors))
	for i, f := range factors {
		operands[i] = Operand{Over: f.over, X: wrapSigns(f.signs, f.x)}
	}
	if len(operands) == 1 {
		return operands[0].X
	}
	operands[0].Over = false
	return &Product{node{operands[0].X.Span().Join(operands[len(operands)-1].X.Span())}, operands}
}

// signs reads the signs before a factor.
func (p *exprParser) signs() []lexer.Token {
	var signs []lexer.Token
	for p.at("+") || p.at("-") {
		if len(signs) == maxDepth {
			p.depth = maxDepth
			p.enter()
		}
		signs = append(signs, *p.lex.Next())
	}
	return signs
}

func wrapSigns(signs []lexer.Token, x Expr) Expr {
	for i := len(signs) - 1; i >= 0; i-- {
		t := &signs[i]
		x = &Sign{node{tokenSpan(t).Join(x.Span())}, canonicalMark(t.Value) == "-", x}
	}
	return x
}

// target reads [u] and what follows it; the last factors that contain box become the
// operator.
func (p *exprParser) target(factors []signed) []signed {
	first := len(factors) - 1
	for first > 0 && hasBox(factors[first].x) && !factors[first].over &&
		!factors[first-1].over && hasBox(factors[first-1].x) {
		first--
	}
	head := factors[first]
	operator := joinUnsigned(factors[first:])
	p.expect("[", "before what the operator acts on")
	x := p.inner()
	end := p.expect("]", "after what the operator acts on")
	applied := Expr(&Apply{node{operator.Span().Join(end)}, operator, x})
	head.x = p.raised(p.suffixes(applied))
	return append(factors[:first], head)
}

// joinUnsigned joins factors with the signs of the first one left out.
func joinUnsigned(factors []signed) Expr {
	inner := slices.Clone(factors)
	inner[0].signs, inner[0].over = nil, false
	return joinFactors(inner)
}

// hasBox reports whether box stands in x with nothing to act on.
func hasBox(x Expr) bool {
	found := false
	Walk(x, func(y Expr) bool {
		switch n := y.(type) {
		case *Apply:
			return false
		case *Name:
			found = found || n.Name == "box"
		}
		return !found
	})
	return found
}

// inner reads an expression in brackets, where both derivative marks have their meaning.
func (p *exprParser) inner() Expr {
	comma, semicolon, depth := p.comma, p.semicolon, p.depth
	p.comma, p.semicolon, p.depth = true, true, 0
	x := p.sum()
	p.noOperand(x)
	p.comma, p.semicolon, p.depth = comma, semicolon, depth
	return x
}

// power = postfix { "!" } [ "^" exponent ].
func (p *exprParser) power() Expr {
	return p.raised(p.postfix())
}

// raised reads factorial marks and the exponent behind x.
func (p *exprParser) raised(x Expr) Expr {
	for count := 0; p.at("!"); count++ {
		if count == maxDepth {
			p.depth = maxDepth
			p.enter()
		}
		x = &Factorial{node{x.Span().Join(tokenSpan(p.lex.Next()))}, x}
	}
	if !p.at("^") {
		return x
	}
	p.lex.Next()
	p.enter()
	exponent := p.exponent()
	p.depth--
	return &Power{node{x.Span().Join(exponent.Span())}, x, exponent}
}

// exponent = { sign } power, so that powers associate to the right.
func (p *exprParser) exponent() Expr {
	signs := p.signs()
	return wrapSigns(signs, p.power())
}

// postfix = number | ( name | "(" sum ")" ) { suffix }.
func (p *exprParser) postfix() Expr {
	t := p.lex.Peek()
	switch {
	case t.Type == tokenNumber:
		p.lex.Next()
		return number(t)
	case t.Type == tokenName:
		p.lex.Next()
		return p.suffixes(&Name{node{tokenSpan(t)}, t.Value, Canonical(t.Value)})
	case p.at("("):
		return p.suffixes(p.paren())
	case p.at("√"):
		return p.root()
	}
	if t.Type == tokenMark && (t.Value == "[" || t.Value == "]") {
		p.unexpected("square brackets follow an operator that contains box, as in box[u]")
	}
	p.unexpected("a name, a number or a bracket is expected")
	return nil
}

func (p *exprParser) paren() Expr {
	start := p.expect("(", "")
	x := p.inner()
	end := p.expect(")", "to close the bracket")
	return &Paren{node{start.Join(end)}, x}
}

// root = "√" ( number | "(" sum ")" ), another spelling of sqrt( … ).
func (p *exprParser) root() Expr {
	at := tokenSpan(p.lex.Next())
	f := &Name{node{at}, "sqrt", "sqrt"}
	if p.at("(") {
		b := p.paren().(*Paren)
		return p.suffixes(&Call{node{at.Join(b.At)}, f, []Expr{b.X}})
	}
	t := p.lex.Peek()
	if t.Type != tokenNumber {
		p.unexpected("a number or a bracket is expected behind the root")
	}
	x := number(p.lex.Next())
	return p.suffixes(&Call{node{at.Join(x.At)}, f, []Expr{x}})
}

// suffixes reads what binds tightest.
func (p *exprParser) suffixes(x Expr) Expr {
	called := false
	for count := 0; ; count++ {
		if count == maxDepth {
			p.depth = maxDepth
			p.enter()
		}
		switch {
		case p.at("'") || p.at("''") || p.at("'''"):
			x = p.prime(x)
		case p.at(",") && p.comma, p.at(";") && p.semicolon:
			x = p.deriv(x)
		case p.at("."):
			x = p.index(x)
		case p.at("(") && !called && callable(x):
			x, called = p.call(x), true
		default:
			return x
		}
	}
}

func (p *exprParser) prime(x Expr) Expr {
	n, at := 0, x.Span()
	for p.at("'") || p.at("''") || p.at("'''") {
		t := p.lex.Next()
		n += len(canonicalMark(t.Value))
		at = at.Join(tokenSpan(t))
	}
	if n > maxDepth {
		panic(newFault(diag.TooDeep, at, "too many primes in a row", "at most 1000 are read"))
	}
	return &Prime{node{at}, x, n}
}

func (p *exprParser) deriv(x Expr) Expr {
	mark := p.lex.Next().Value
	t := p.lex.Peek()
	if t.Type != tokenName {
		if mark == "," {
			p.unexpected("a comma differentiates here: index letters or the name of an argument follow it")
		}
		p.unexpected("a semicolon is the covariant derivative: index letters follow it")
	}
	p.lex.Next()
	label := Name{node{tokenSpan(t)}, t.Value, Canonical(t.Value)}
	return &Deriv{node{x.Span().Join(label.At)}, x, mark, label}
}

func (p *exprParser) index(x Expr) Expr {
	dot := tokenSpan(p.lex.Next())
	t := p.lex.Peek()
	var label Expr
	switch {
	case t.Type == tokenName:
		label = &Name{node{tokenSpan(t)}, t.Value, Canonical(t.Value)}
	case t.Type == tokenNumber && t.Pos.Offset == dot.End && strings.Trim(t.Value, "0123456789") == "":
		label = number(t)
	default:
		p.unexpected("a dot is followed by indices, as in K.ij, or by the number of a Taylor coefficient, as in F.2")
	}
	p.lex.Next()
	return &Index{node{x.Span().Join(label.Span())}, x, label}
}

// callable reports whether a bracket behind x holds arguments: x is a name, maybe with
// primes, derivatives or a Taylor number.
func callable(x Expr) bool {
	for {
		switch n := x.(type) {
		case *Name:
			return true
		case *Prime:
			x = n.X
		case *Deriv:
			x = n.X
		case *Index:
			x = n.X
		default:
			return false
		}
	}
}

// call = "(" item { "," item } ")".
func (p *exprParser) call(f Expr) Expr {
	p.expect("(", "")
	comma, semicolon, depth := p.comma, p.semicolon, p.depth
	p.comma, p.semicolon, p.depth = false, true, 0
	var args []Expr
	for {
		x := p.sum()
		p.noOperand(x)
		args = append(args, x)
		if !p.at(",") {
			break
		}
		p.lex.Next()
	}
	end := p.expect(")", "to close the arguments")
	p.comma, p.semicolon, p.depth = comma, semicolon, depth
	return &Call{node{f.Span().Join(end)}, f, args}
}

// number reads a numeral exactly. Its decimal exponent is bounded, so that no short
// text makes a number that fills the memory.
func number(t *lexer.Token) *Number {
	at := tokenSpan(t)
	if r, _ := utf8.DecodeRuneInString(t.Value); vulgar[r] != [2]int64{} {
		v := vulgar[r]
		return &Number{node{at}, t.Value, big.NewRat(v[0], v[1])}
	}
	if _, exp, ok := strings.Cut(strings.ToLower(t.Value), "e"); ok {
		digits := strings.TrimLeft(exp, "+-0")
		if len(digits) > 4 || atoi(digits) > maxExponent {
			panic(newFault(diag.NumberTooLarge, at, "the exponent of '"+t.Value+"' is too large", "exponents up to 1000 are read"))
		}
	}
	value, ok := new(big.Rat).SetString(t.Value)
	if !ok {
		panic(newFault(diag.UnexpectedToken, at, "'"+t.Value+"' is no number", "numbers are written 3, 0.25 or 2e-5"))
	}
	return &Number{node{at}, t.Value, value}
}

// atoi is the value of a short string of digits.
func atoi(digits string) int {
	n := 0
	for i := range len(digits) {
		n = 10*n + int(digits[i]-'0')
	}
	return n
}
