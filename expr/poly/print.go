// Text: a polynomial as a sum of terms in decreasing order.

package poly

import (
	"fmt"
	"math/big"
	"strings"
)

// String names the variables x0, x1, …
func (p Poly) String() string {
	return p.Format(func(v Var) string { return fmt.Sprintf("x%d", v) })
}

// Format writes p with the given names: "2*x^2*y - z + 1", and "0" for the polynomial 0.
func (p Poly) Format(name func(Var) string) string {
	if p.IsZero() {
		return "0"
	}
	var s strings.Builder
	for m, c := range p.Terms() {
		switch {
		case s.Len() > 0 && c.Sign() < 0:
			s.WriteString(" - ")
		case s.Len() > 0:
			s.WriteString(" + ")
		case c.Sign() < 0:
			s.WriteString("-")
		}
		writeTerm(&s, new(big.Int).Abs(c), m, name)
	}
	return s.String()
}

// writeTerm writes c·m for positive c.
func writeTerm(s *strings.Builder, c *big.Int, m []Power, name func(Var) string) {
	if len(m) == 0 || !c.IsInt64() || c.Int64() != 1 {
		s.WriteString(c.String())
		if len(m) > 0 {
			s.WriteByte('*')
		}
	}
	for i, x := range m {
		if i > 0 {
			s.WriteByte('*')
		}
		s.WriteString(name(x.Var))
		if x.Exp > 1 {
			fmt.Fprintf(s, "^%d", x.Exp)
		}
	}
}
