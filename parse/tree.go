package parse

import (
	"math/big"

	"github.com/alecthomas/participle/v2/lexer"

	"remnant/parse/diag"
)

// The syntax tree. Statements are structs of the grammar that participle fills, one per
// production; an expression is a tree of nodes made by precedence climbing (expr.go).
// Every node knows its place, and keeps the text as it was typed.

// File is a parsed file. Statements that could not be parsed are absent from it.
type File struct {
	Source     *diag.Source
	Statements []*Statement
	Comments   []Comment

	unread []string // the first words of the lines that could not be read
}

// Statement is one logical line; exactly one of the pointers and lists is set.
type Statement struct {
	Keyword Word `parser:""`
	At      diag.Span

	Model      *Title       `parser:"( 'model' @@"`
	Clock      *Word        `parser:"| 'clock' @@"`
	Constants  []*Symbol    `parser:"| 'constants' @@ ( ',' @@ )*"`
	Background []*Symbol    `parser:"| 'background' @@ ( ',' @@ )*"`
	Functions  []*Function  `parser:"| 'functions' @@ ( ',' @@ )*"`
	FormFactor *FormFactor  `parser:"| 'formfactor' @@"`
	Let        *Definition  `parser:"| 'let' @@"`
	Given      *Relation    `parser:"| 'given' @@"`
	Fields     []*Word      `parser:"| 'fields' @@ ( ',' @@ )*"`
	Gauge      *Word        `parser:"| 'gauge' @@"`
	Sector     *Word        `parser:"| 'sector' @@"`
	Lagrangian *Lagrangian  `parser:"| 'lagrangian' @@"`
	Keep       *KeepClause  `parser:"| 'keep' @@"`
	Small      *SmallClause `parser:"| 'small' @@"`
	Numbers    []*Equation  `parser:"| 'numbers' @@ ( ',' @@ )* )"`
}

// Word is a name with its place.
type Word struct {
	Pos  lexer.Position
	Text string `parser:"@Name"` // as typed
}

// Name is the canonical form of the word.
func (w *Word) Name() string { return Canonical(w.Text) }

// Span is the place of the word.
func (w *Word) Span() diag.Span {
	return diag.Span{Start: w.Pos.Offset, End: w.Pos.Offset + len(w.Text)}
}

// Title is the title of a model, with its quotation marks.
type Title struct {
	Pos    lexer.Position
	Quoted string `parser:"@String"`
}

// Text is the title without the quotation marks.
func (t *Title) Text() string { return t.Quoted[1 : len(t.Quoted)-1] }

// Symbol is a declared name with an optional sign: eps > 0.
type Symbol struct {
	Word Word   `parser:"@@"`
	Sign string `parser:"( @( '>' | '<' ) '0' )?"`
}

// Function is a declared function with an optional definition: V(phi) = m^2*phi^2/2.
type Function struct {
	Word       Word        `parser:"@@ '('"`
	Arguments  []*Argument `parser:"@@ ( ',' @@ )* ')'"`
	Definition *Item       `parser:"( '=' @@ )?"`
}

// Argument is what a function depends on: phi, X, or X(phi).
type Argument struct {
	Word Word  `parser:"@@"`
	Of   *Word `parser:"( '(' @@ ')' )?"`
}

// FormFactor is a declared form factor F(box), free, defined, or given by a rule for its
// Taylor coefficients.
type FormFactor struct {
	Word       Word     `parser:"@@ '('"`
	Argument   Word     `parser:"@@ ')'"`
	Definition *Formula `parser:"( '=' @@"`
	Rule       *Rule    `parser:"| ':' @@ )?"`
}

// Rule gives the Taylor coefficients of a form factor: F.n = 1/n!.
type Rule struct {
	Of    Word     `parser:"@@ '.'"`
	Bound Word     `parser:"@@ '='"`
	Value *Formula `parser:"@@"`
}

// Definition is name = expression.
type Definition struct {
	Word  Word     `parser:"@@ '='"`
	Value *Formula `parser:"@@"`
}

// Relation is a background relation, rewritten from left to right.
type Relation struct {
	Left  *Formula `parser:"@@ '='"`
	Right *Formula `parser:"@@"`
}

// Lagrangian is an action in one of the three forms.
type Lagrangian struct {
	Form  Word     `parser:"@@ '='"`
	Value *Formula `parser:"@@"`
}

// KeepClause names the variable to reduce to, or defines a new one.
type KeepClause struct {
	Word       Word     `parser:"@@"`
	Definition *Formula `parser:"( '=' @@ )?"`
}

// SmallClause lists parameters that series are truncated in.
type SmallClause struct {
	Names []*Word `parser:"@@ ( ',' @@ )*"`
	Order *Whole  `parser:"'to' 'order' @@"`
}

// Whole is a number where no expression may stand.
type Whole struct {
	Pos  lexer.Position
	Text string `parser:"@Number"`
}

// Span is the place of the number.
func (w *Whole) Span() diag.Span {
	return diag.Span{Start: w.Pos.Offset, End: w.Pos.Offset + len(w.Text)}
}

// Equation is name = value in a list: phi'(0) = -1/10^6.
type Equation struct {
	Left  *Item `parser:"@@ '='"`
	Right *Item `parser:"@@"`
}

// Span is the place of the equation.
func (e *Equation) Span() diag.Span { return e.Left.X.Span().Join(e.Right.X.Span()) }

// Formula is an expression in which a comma differentiates.
type Formula struct{ X Expr }

// Item is an expression in a list, where a comma separates.
type Item struct{ X Expr }

// Expr is a node of an expression.
type Expr interface {
	// Span is the place of the node with everything below it.
	Span() diag.Span
}

// node is the place of a node; it makes every type that holds it an Expr.
type node struct{ At diag.Span }

// Span is the place of the node.
func (n node) Span() diag.Span { return n.At }

// The nodes.
type (
	// Number is a numeral; its value is exact.
	Number struct {
		node
		Text  string
		Value *big.Rat
	}
	// Name is a name standing for something.
	Name struct {
		node
		Text string // as typed
		Name string // canonical
	}
	// Paren is an expression in brackets.
	Paren struct {
		node
		X Expr
	}
	// Sign is +x or -x.
	Sign struct {
		node
		Minus bool
		X     Expr
	}
	// Sum is x + y - z.
	Sum struct {
		node
		Terms []Summand
	}
	// Summand is a member of a sum, with the mark before it.
	Summand struct {
		Minus bool
		X     Expr
	}
	// Product is x*y/z.
	Product struct {
		node
		Factors []Operand
	}
	// Operand is a member of a product, with the mark before it.
	Operand struct {
		Over bool // divided by
		X    Expr
	}
	// Power is x^y.
	Power struct {
		node
		Base, Exponent Expr
	}
	// Factorial is x!.
	Factorial struct {
		node
		X Expr
	}
	// Prime is x with primes: its time derivative.
	Prime struct {
		node
		X     Expr
		Count int
	}
	// Deriv is x,ij or x;ab or V,phi: a derivative by what the label names.
	Deriv struct {
		node
		X     Expr
		Mark  string // "," or ";"
		Label Name
	}
	// Index is Ric.ab or F.2: indices, or the number of a Taylor coefficient.
	Index struct {
		node
		X     Expr
		Label Expr // Name or Number
	}
	// Call is f(x, y); of a square root typed as √ too.
	Call struct {
		node
		Fun  Expr
		Args []Expr
	}
	// Apply is an operator with what it acts on: box[u].
	Apply struct {
		node
		Operator Expr
		X        Expr
	}
)
