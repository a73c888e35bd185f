// Package ringtest holds one suite of axioms for every algebraic structure of the
// program: rings, commutative or not, fields, and rings with a derivation. A structure
// describes itself by functions; the suite draws elements and checks identities.
package ringtest

import (
	"fmt"
	"testing"

	"pgregory.net/rapid"
)

// Ring describes a structure with elements of type E.
type Ring[E any] struct {
	Zero, One E
	Add, Mul  func(a, b E) E
	Neg       func(a E) E
	Equal     func(a, b E) bool
	Gen       *rapid.Generator[E]

	// Commutative says that Mul commutes.
	Commutative bool

	// The rest is optional.

	Sub    func(a, b E) E         // a + (−b)
	Inv    func(a E) (E, bool)    // the inverse; false if there is none
	Derive func(a E) E            // a derivation
	Quo    func(a, b E) (E, bool) // exact division: a = (a/b)·b; false if b does not divide a
	Check  func(a E) error        // reports an element that is not in canonical form
	Show   func(a E) string       // a text that differs for different elements
}

// Axioms checks the axioms, each as a subtest. For every result of an operation it
// calls Check; where Show is given, operands are seen to be unchanged.
func Axioms[E any](t *testing.T, r Ring[E]) {
	t.Helper()
	for _, law := range r.laws() {
		t.Run(law.name, func(t *testing.T) {
			rapid.Check(t, func(t *rapid.T) {
				c := &checker[E]{Ring: r, t: t}
				law.holds(c, c.valid(r.Gen.Draw(t, "a")), c.valid(r.Gen.Draw(t, "b")), c.valid(r.Gen.Draw(t, "c")))
			})
		})
	}
}

// law is an identity in up to three elements.
type law[E any] struct {
	name  string
	holds func(c *checker[E], x, y, z E)
}

func (r Ring[E]) laws() []law[E] {
	laws := []law[E]{
		{"addition associates", func(c *checker[E], x, y, z E) {
			c.same(c.add(c.add(x, y), z), c.add(x, c.add(y, z)))
		}},
		{"addition commutes", func(c *checker[E], x, y, _ E) { c.same(c.add(x, y), c.add(y, x)) }},
		{"zero is neutral", func(c *checker[E], x, _, _ E) { c.same(c.add(x, c.Zero), x) }},
		{"negative cancels", func(c *checker[E], x, _, _ E) { c.same(c.add(x, c.neg(x)), c.Zero) }},
		{"product associates", func(c *checker[E], x, y, z E) {
			c.same(c.mul(c.mul(x, y), z), c.mul(x, c.mul(y, z)))
		}},
		{"one is neutral", func(c *checker[E], x, _, _ E) {
			c.same(c.mul(x, c.One), x)
			c.same(c.mul(c.One, x), x)
		}},
		{"zero absorbs", func(c *checker[E], x, _, _ E) {
			c.same(c.mul(x, c.Zero), c.Zero)
			c.same(c.mul(c.Zero, x), c.Zero)
		}},
		{"product distributes from the left", func(c *checker[E], x, y, z E) {
			c.same(c.mul(x, c.add(y, z)), c.add(c.mul(x, y), c.mul(x, z)))
		}},
		{"product distributes from the right", func(c *checker[E], x, y, z E) {
			c.same(c.mul(c.add(y, z), x), c.add(c.mul(y, x), c.mul(z, x)))
		}},
		{"negative of a product", func(c *checker[E], x, y, _ E) {
			c.same(c.neg(c.mul(x, y)), c.mul(c.neg(x), y))
			c.same(c.mul(c.neg(x), y), c.mul(x, c.neg(y)))
		}},
		{"equality is an equivalence", func(c *checker[E], x, y, _ E) {
			c.same(x, x)
			if c.Equal(x, y) != c.Equal(y, x) {
				c.t.Fatalf("equality is not symmetric: %s, %s", c.show(x), c.show(y))
			}
		}},
	}
	return append(laws, r.optional()...)
}

// optional is the laws of the operations that a structure need not have.
func (r Ring[E]) optional() []law[E] {
	var laws []law[E]
	if r.Commutative {
		laws = append(laws, law[E]{"product commutes", func(c *checker[E], x, y, _ E) { c.same(c.mul(x, y), c.mul(y, x)) }})
	}
	if r.Sub != nil {
		laws = append(laws, law[E]{"difference", func(c *checker[E], x, y, _ E) {
			c.same(c.valid(c.Sub(x, y)), c.add(x, c.neg(y)))
		}})
	}
	if r.Inv != nil {
		laws = append(laws, law[E]{"inverse", func(c *checker[E], x, _, _ E) {
			if i, ok := c.Inv(x); ok {
				c.same(c.mul(x, c.valid(i)), c.One)
				c.same(c.mul(i, x), c.One)
			}
		}})
	}
	if r.Quo != nil {
		laws = append(laws, law[E]{"quotient", func(c *checker[E], x, y, _ E) {
			if c.Equal(y, c.Zero) {
				return
			}
			q, ok := c.Quo(c.mul(x, y), y)
			if !ok {
				c.t.Fatalf("%s does not divide its product with %s", c.show(y), c.show(x))
			}
			c.same(c.valid(q), x)
			if q, ok := c.Quo(x, y); ok {
				c.same(c.mul(q, y), x)
			}
		}})
	}
	if r.Derive != nil {
		laws = append(laws, law[E]{"derivation is additive", func(c *checker[E], x, y, _ E) {
			c.same(c.derive(c.add(x, y)), c.add(c.derive(x), c.derive(y)))
		}}, law[E]{"derivation of a product", func(c *checker[E], x, y, _ E) {
			c.same(c.derive(c.mul(x, y)), c.add(c.mul(c.derive(x), y), c.mul(x, c.derive(y))))
		}})
	}
	return laws
}

// checker performs the operations and checks what can be seen of one at a time.
type checker[E any] struct {
	Ring[E]
	t interface {
		Fatalf(format string, args ...any)
	}
}

func (c *checker[E]) add(x, y E) E { return c.binary("sum", c.Add, x, y) }
func (c *checker[E]) mul(x, y E) E { return c.binary("product", c.Mul, x, y) }

func (c *checker[E]) neg(x E) E {
	return c.binary("negative", func(x, _ E) E { return c.Neg(x) }, x, x)
}

func (c *checker[E]) derive(x E) E {
	return c.binary("derivative", func(x, _ E) E { return c.Derive(x) }, x, x)
}

// binary performs an operation, and sees that its operands are unchanged.
func (c *checker[E]) binary(name string, op func(x, y E) E, x, y E) E {
	if c.Show == nil {
		return c.valid(op(x, y))
	}
	before := [2]string{c.Show(x), c.Show(y)}
	r := c.valid(op(x, y))
	if after := [2]string{c.Show(x), c.Show(y)}; after != before {
		c.t.Fatalf("the %s changed its operands from %q to %q", name, before, after)
	}
	return r
}

// valid is x, which must be in canonical form.
func (c *checker[E]) valid(x E) E {
	if c.Check != nil {
		if err := c.Check(x); err != nil {
			c.t.Fatalf("%s is not canonical: %v", c.show(x), err)
		}
	}
	return x
}

func (c *checker[E]) same(x, y E) {
	if !c.Equal(x, y) {
		c.t.Fatalf("not equal:\n  %s\n  %s", c.show(x), c.show(y))
	}
}

func (c *checker[E]) show(x E) string {
	if c.Show != nil {
		return c.Show(x)
	}
	return fmt.Sprint(x)
}
