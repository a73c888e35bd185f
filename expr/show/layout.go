// Package show writes expressions for people and for programs.
//
// An expression is laid out once, as a tree of Nodes; writers print the tree as Unicode
// text, ASCII text, the user's notation, LaTeX or Go. What stands where (which factor comes
// first, what is a quotient, which sign leads) is decided in the tree, how it looks in the
// writers. Everything is deterministic.
package show

// The layout tree and its constructors.

import (
	"math/big"
	"strconv"
)

// Node is a part of a laid-out expression. Nodes are immutable.
type Node interface{ isNode() }

type (
	// number is a natural number.
	number struct{ n *big.Int }
	// symbol is a name with time derivatives, or a free function's derivative by the
	// arguments named in by. If oneX, the function has one argument of the form X(phi), which
	// readers know as X.
	symbol struct {
		name   string
		primes int
		by     []string
		oneX   bool
	}
	// sum is what its terms add to; a term that is a negation is subtracted.
	sum struct{ terms []Node }
	// negation is −x.
	negation struct{ x Node }
	// product is what its factors multiply to; before factor gap (> 0) stands a space.
	product struct {
		factors []Node
		gap     int
	}
	// quotient is num/den.
	quotient struct{ num, den Node }
	// power is base^exp.
	power struct {
		base Node
		exp  int
	}
	// call is fn(arg).
	call struct {
		fn  string
		arg Node
	}
	// bracket is [ x ], or ( x ) where square brackets mean something else.
	bracket struct{ x Node }
	// spatial is ∂ⁿx, for even n a power of the Laplacian.
	spatial struct {
		n int
		x symbol
	}
	// contracted is ∂ⁿx·∂ⁿy, all indices of the one summed with those of the other.
	contracted struct {
		n    int
		x, y symbol
	}
	// equation is lhs = rhs, or an equality of more than two sides.
	equation struct{ sides []Node }
	// integral is the action ∫dτ d³x body.
	integral struct {
		clock string
		body  Node
	}
)

func (number) isNode()     {}
func (symbol) isNode()     {}
func (sum) isNode()        {}
func (negation) isNode()   {}
func (product) isNode()    {}
func (quotient) isNode()   {}
func (power) isNode()      {}
func (call) isNode()       {}
func (bracket) isNode()    {}
func (spatial) isNode()    {}
func (contracted) isNode() {}
func (equation) isNode()   {}
func (integral) isNode()   {}

func itoa(n int) string { return strconv.Itoa(n) }

// Int is the integer n.
func Int(n int64) Node { return bigInt(big.NewInt(n)) }

func bigInt(n *big.Int) Node {
	if n.Sign() < 0 {
		return negation{number{new(big.Int).Neg(n)}}
	}
	return number{new(big.Int).Set(n)}
}

// Rat is the rational number r.
func Rat(r *big.Rat) Node {
	if r.IsInt() {
		return bigInt(r.Num())
	}
	abs := new(big.Rat).Abs(r)
	var q Node = quotient{bigInt(abs.Num()), bigInt(abs.Denom())}
	if r.Sign() < 0 {
		q = negation{q}
	}
	return q
}

// Symbol is a name, in the notation's ASCII spelling, with a number of time derivatives.
func Symbol(name string, primes int) Node { return symbol{name: name, primes: primes} }

// Partial is a derivative of a free function by the arguments named, in that order: V,φφ.
func Partial(name string, by ...string) Node {
	return symbol{name: name, by: append([]string(nil), by...)}
}

// Spatial is ∂ⁿ of a field with a number of time derivatives; n is even, and ∂² is the
// Laplacian with δ_ij. Spatial(name, primes, 0) is the field.
func Spatial(name string, primes, n int) Node {
	if n%2 != 0 {
		panic("show: an odd number of spatial derivatives leaves an index open")
	}
	s := symbol{name: name, primes: primes}
	if n == 0 {
		return s
	}
	return spatial{n, s}
}

// isNumber reports whether n is the natural number m.
func isNumber(n Node, m int64) bool {
	x, ok := n.(number)
	return ok && x.n.IsInt64() && x.n.Int64() == m
}

// Sum adds nodes; zeros are left out, and sums among them are joined.
func Sum(terms ...Node) Node {
	var out []Node
	for _, t := range terms {
		switch t := t.(type) {
		case sum:
			out = append(out, t.terms...)
		default:
			if !isNumber(t, 0) {
				out = append(out, t)
			}
		}
	}
	switch len(out) {
	case 0:
		return Int(0)
	case 1:
		return out[0]
	}
	return sum{out}
}

// Neg is −x.
func Neg(x Node) Node {
	if n, ok := x.(negation); ok {
		return n.x
	}
	if isNumber(x, 0) {
		return x
	}
	return negation{x}
}

// Product multiplies nodes; ones are left out, signs are drawn before the product, and
// products among the factors are joined.
func Product(factors ...Node) Node { return multiply(factors, 0) }

// multiply is the product with a space before what the factors from gap on become.
func multiply(factors []Node, gap int) Node {
	var out []Node
	neg, at := false, 0
	for i, x := range factors {
		if i == gap {
			at = len(out)
		}
		if n, ok := x.(negation); ok {
			neg, x = !neg, n.x
		}
		switch x := x.(type) {
		case product:
			out = append(out, x.factors...)
		default:
			if isNumber(x, 0) {
				return x
			}
			if !isNumber(x, 1) {
				out = append(out, x)
			}
		}
	}
	var p Node
	switch len(out) {
	case 0:
		p = Int(1)
	case 1:
		p = out[0]
	default:
		p = product{out, at}
	}
	if neg {
		p = Neg(p)
	}
	return p
}

// Quotient is num/den.
func Quotient(num, den Node) Node {
	if isNumber(den, 1) {
		return num
	}
	if n, ok := num.(negation); ok {
		return Neg(Quotient(n.x, den))
	}
	return quotient{num, den}
}

// Power is base^exp.
func Power(base Node, exp int) Node {
	if exp == 1 {
		return base
	}
	return power{base, exp}
}

// Call is a function of one argument: sqrt, exp, log, sin, cos, tanh.
func Call(fn string, arg Node) Node { return call{fn, arg} }

// Bracket is x in square brackets.
func Bracket(x Node) Node { return bracket{x} }

// Equation is lhs = rhs; more sides make a chain of equalities.
func Equation(sides ...Node) Node { return equation{append([]Node(nil), sides...)} }

// Integral is ∫dτ d³x body; the clock is t, eta or N.
func Integral(clock string, body Node) Node { return integral{clock, body} }
