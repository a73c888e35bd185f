package parse

import (
	"remnant/expr/field"
	"remnant/parse/diag"
)

// Clock is the time variable τ of a model; a prime is d/dτ.
type Clock uint8

const (
	Cosmic    Clock = iota // t, N̄ = 1
	Conformal              // η, N̄ = a
	Efolds                 // N = log a, N̄ = 1/H
)

// String is the word of the notation.
func (c Clock) String() string { return clockWords[c] }

// Model is an elaborated file: every name resolved, every coefficient an element of the
// field K, reduced by the background relations. It is not changed after it was made; K
// itself may be given further jets and assumptions by those who compute in it.
type Model struct {
	Source *diag.Source
	Title  string // empty if the file gives none
	Clock  Clock

	K          *field.Field
	A          field.Elem // the scale factor; 1 if the model declares no a
	Lapse      field.Elem // N̄: 1, a or 1/H
	Wavenumber field.Elem // k

	Constants  []Declared
	Background []Declared
	Functions  []FunctionDecl
	Fields     []FieldDecl
	Relations  []RelationDecl // in the order of the numbers that K knows them by
	Lets       []Let

	FormFactors    []*FormFactorDecl
	Eigenfunctions []Eigenfunction

	Quadratic      []Term // the Lagrangian of the quadratic form
	Covariant      Tensor // the Lagrangian of the covariant form; nil in the others
	ADM            Tensor // the Lagrangian of the adm form; nil in the others
	LagrangianSpan diag.Span

	Gauge     Gauge
	GaugeSpan diag.Span // the Lagrangian's where no gauge is chosen
	Sector    Sector

	Keep       *Keep // nil if the file does not choose
	Small      []field.Gen
	SmallOrder int
	Numbers    []NumberDecl

	scope *elaborator // resolves names that are given later, such as those of a point
}

// Scalars lists the scalar fields of a covariant model: the functions of time that are not
// part of the metric. In an adm model functions of time are given, and no fields.
func (m *Model) Scalars() []field.Gen {
	if m.ADM != nil {
		return nil
	}
	var out []field.Gen
	for _, b := range m.Background {
		if b.Name != "a" && b.Name != "H" {
			out = append(out, b.Gen)
		}
	}
	return out
}

// Declared is a constant or a background function.
type Declared struct {
	Name string // canonical
	Span diag.Span
	Gen  field.Gen
}

// FieldDecl is a perturbation.
type FieldDecl struct {
	Name string // canonical
	Span diag.Span
}

// FunctionDecl is a free function of background quantities. The algebra keeps the
// function; a definition, where there is one, is for numbers.
type FunctionDecl struct {
	Name       string
	Span       diag.Span
	Fn         *field.FreeFunc
	Definition Expr       // nil if it has none
	Value      field.Elem // the definition on the background

	// In the adm form N, K, R3 and Vn as arguments are no generators on the background. Formal is
	// the definition with a constant in the place of each, StandIns; else it is Value.
	Formal   field.Elem
	StandIns map[int]field.Gen // by the number of the argument
}

// RelationDecl is a background relation: a given of the file, or one that the clock
// brings along.
type RelationDecl struct {
	Text string
	Span diag.Span // empty for one that the clock brings along
	Auto bool
}

// Let is an abbreviation.
type Let struct {
	Name       string
	Span       diag.Span
	Background bool       // it holds no perturbation
	Value      field.Elem // of a background abbreviation
}

// NumberDecl is the value of a constant, or the initial value of a background jet.
type NumberDecl struct {
	Gen     field.Gen
	Initial bool
	Value   field.Elem // holds no generator but constants like π and roots of numbers
	Span    diag.Span
}

// Keep is the variable to reduce to: a field, or a new one by its definition.
type Keep struct {
	Name       string
	Span       diag.Span
	Field      int          // index in Fields; -1 for a new variable
	Definition []LinearTerm // of a new variable
}

// Factor is D^Time ∂^Space of a field.
type Factor struct {
	Field, Time, Space int
}

// Term is Coef · U · V. All indices of the space derivatives are summed, so U.Space +
// V.Space is even, and in Fourier space, with p = U.Space and q = V.Space, the term is
// (−1)^((p−q)/2) k^(p+q) Coef D^U.Time u D^V.Time v.
type Term struct {
	Coef field.Elem
	U, V Factor
	Span diag.Span
}

// LinearTerm is Coef · U with U.Space even: (−k²)^(Space/2) Coef D^Time u.
type LinearTerm struct {
	Coef field.Elem
	U    Factor
	Span diag.Span
}
