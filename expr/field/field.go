// Package field is the differential field that all coefficients live in: rational
// functions over ℚ in constants, the wave number k, jets of background functions
// (x, x′, x″, …), jets of free functions (V, V,φ, P,φX, …), square roots and elementary
// functions, with the derivation D = d/dτ and oriented background relations.
//
// An element is an integer polynomial over a product of powers of known factors. The
// factors are pairwise coprime (a gcd-free basis kept by factor refinement,
// [BachDriscollShallit1993]), so that a fraction is cancelled by trial exact division and
// never by expanding a denominator. Every element is kept reduced by the relations: a
// leader never appears in it. Equality is exact.
//
// A Field is not safe for concurrent use: arithmetic may add factors and jets to it.
package field

import (
	"math/big"

	"remnant/expr/budget"
	"remnant/expr/poly"
)

// Gen is the number of a generator: its variable in the polynomials of the field.
type Gen = poly.Var

// Kind tells what a generator stands for.
type Kind uint8

const (
	Constant     Kind = iota // a constant of the model, or π
	Wavenumber               // k, the comoving wave number
	Function                 // a jet x⁽ⁿ⁾ of a background function of time
	FreeFunction             // a jet of a free function: V,φ or P,φX
	Root                     // s with s² = Arg
	Elementary               // exp, log, sin, … of Arg
)

// Sign is what is known of a real quantity.
type Sign int8

const (
	Negative Sign = -1
	Unknown  Sign = 0
	Positive Sign = 1
)

// Info describes a generator.
type Info struct {
	Kind  Kind
	Name  string    // notation's name: "phi", "V", "exp"
	Order int       // Function: the number of time derivatives
	Fn    *FreeFunc // FreeFunction
	Index []int     // FreeFunction: derivatives by each argument
	Arg   Elem      // Root: the radicand; Elementary: the argument
	Angle Elem      // a Root named "cos": the argument of the cosine
	Sign  Sign      // declared, or known from the kind
}

// FreeFunc is a function of background quantities, such as P(φ, X).
type FreeFunc struct {
	Name     string
	ArgNames []string
	Args     []Elem // the arguments on the background
	jets     map[string]Gen
}

type generator struct {
	Info
	jets  map[int]Gen // Function, on the generator of order 0: its jets
	base  Gen         // Function: the generator of order 0
	rule  *rule       // the relation of which this generator is the leader
	value cached      // its value modulo the relations
	deriv cached      // its derivative modulo the relations
	open  bool        // its value is being found
}

// cached is a value that holds for one state of the relations.
type cached struct {
	epoch int
	elem  Elem
}

// Field is one differential field with its relations and assumptions.
type Field struct {
	ops         poly.Ops
	gens        []*generator
	names       map[string]Gen
	factors     []*factor
	byVar       map[Gen]int32
	byHash      map[uint64][]int32
	splits      int   // how many factors were replaced by finer ones
	roots       []Gen // generators with s² = r, in order of creation
	epoch       int   // counts changes of the relations
	assumptions []Assumption
	functions   map[string]*FreeFunc
}

// New returns the field ℚ with nothing adjoined. Its work is bounded by b (nil: not).
func New(b *budget.Budget) *Field {
	return &Field{
		ops:       poly.Ops{Budget: b},
		names:     map[string]Gen{},
		byVar:     map[Gen]int32{},
		byHash:    map[uint64][]int32{},
		functions: map[string]*FreeFunc{},
		epoch:     1,
	}
}

// Budget is the budget that the field's arithmetic is bounded by.
func (f *Field) Budget() *budget.Budget { return f.ops.Budget }

// SetBudget replaces the budget; one stage of a run may be bounded unlike another.
func (f *Field) SetBudget(b *budget.Budget) { f.ops.Budget = b }

func (f *Field) add(g generator) Gen {
	id := Gen(len(f.gens))
	g.base = id
	f.gens = append(f.gens, &g)
	return id
}

func (f *Field) named(name string, g generator) Gen {
	if _, taken := f.names[name]; taken {
		panic("field: the name " + name + " is declared twice")
	}
	g.Name = name
	id := f.add(g)
	f.names[name] = id
	return id
}

// Constant adjoins a constant: its derivative is zero.
func (f *Field) Constant(name string, s Sign) Gen {
	return f.named(name, generator{Info: Info{Kind: Constant, Sign: s}})
}

// Wavenumber adjoins the comoving wave number, a positive constant.
func (f *Field) Wavenumber(name string) Gen {
	return f.named(name, generator{Info: Info{Kind: Wavenumber, Sign: Positive}})
}

// Function adjoins a background function of time with all its derivatives.
func (f *Field) Function(name string, s Sign) Gen {
	g := f.named(name, generator{Info: Info{Kind: Function, Sign: s}})
	f.gens[g].jets = map[int]Gen{0: g}
	return g
}

// FreeFunction adjoins a free function of the given background quantities with all its
// partial derivatives. The names are those that differentiation uses: V,phi.
func (f *Field) FreeFunction(name string, argNames []string, args []Elem, s Sign) *FreeFunc {
	fn := &FreeFunc{Name: name, ArgNames: argNames, Args: args, jets: map[string]Gen{}}
	index := make([]int, len(args))
	g := f.named(name, generator{Info: Info{Kind: FreeFunction, Fn: fn, Index: index, Sign: s}})
	fn.jets[indexKey(index)] = g
	f.functions[name] = fn
	return fn
}

// Lookup finds a generator of order 0 by name.
func (f *Field) Lookup(name string) (Gen, bool) {
	g, ok := f.names[name]
	return g, ok
}

// LookupFunction finds a free function by name.
func (f *Field) LookupFunction(name string) (*FreeFunc, bool) {
	fn, ok := f.functions[name]
	return fn, ok
}

// Info describes generator g.
func (f *Field) Info(g Gen) Info { return f.gens[g].Info }

// NumGens is the number of generators so far; they are numbered from 0.
func (f *Field) NumGens() int { return len(f.gens) }

// JetGen is the generator of the n-th time derivative of the background function whose
// generator of any order is x.
func (f *Field) JetGen(x Gen, n int) Gen {
	base := f.gens[x].base
	b := f.gens[base]
	if b.Kind != Function {
		panic("field: " + b.Name + " is no function of time")
	}
	if g, ok := b.jets[n]; ok {
		return g
	}
	g := f.add(generator{Info: Info{Kind: Function, Name: b.Name, Order: n}})
	f.gens[g].base = base
	b.jets[n] = g
	return g
}

// Base is the generator of order 0 that the jet g belongs to.
func (f *Field) Base(g Gen) Gen { return f.gens[g].base }

// FuncJetGen is the generator of the partial derivative of fn with index[i] derivatives by
// its i-th argument.
func (f *Field) FuncJetGen(fn *FreeFunc, index []int) Gen {
	key := indexKey(index)
	if g, ok := fn.jets[key]; ok {
		return g
	}
	own := append([]int(nil), index...)
	g := f.add(generator{Info: Info{Kind: FreeFunction, Name: fn.Name, Fn: fn, Index: own}})
	fn.jets[key] = g
	return g
}

func indexKey(index []int) string {
	b := make([]byte, 0, 2*len(index))
	for _, n := range index {
		b = append(b, byte(n), byte(n>>8))
	}
	return string(b)
}

// Gen is the value of a generator: itself, or what the relations replace it by.
func (f *Field) Gen(g Gen) Elem { return f.value(g) }

// Raw is the generator itself, relations not applied: the left side of a relation.
func (f *Field) Raw(g Gen) Elem { return Elem{f: f, num: poly.FromVar(g)} }

// Jet is the value of the n-th time derivative of the background function x.
func (f *Field) Jet(x Gen, n int) Elem { return f.value(f.JetGen(x, n)) }

// FuncJet is the value of a partial derivative of fn.
func (f *Field) FuncJet(fn *FreeFunc, index []int) Elem { return f.value(f.FuncJetGen(fn, index)) }

// Int is the integer n.
func (f *Field) Int(n int64) Elem { return Elem{f: f, num: poly.FromInt(n)} }

// Rat is the rational number r.
func (f *Field) Rat(r *big.Rat) Elem {
	e := Elem{f: f, num: poly.FromBig(r.Num())}
	if !r.IsInt() {
		e.den.int = new(big.Int).Set(r.Denom())
	}
	return e
}

// Poly is a polynomial in the generators, reduced by the relations.
func (f *Field) Poly(p poly.Poly) (Elem, error) { return Elem{f: f, num: p}.Normal() }
