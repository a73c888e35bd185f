package parse

import (
	"math/big"

	"remnant/expr/field"
)

// Tensor is a node of a covariant or adm Lagrangian with every name resolved and every index
// checked: in a product each index letter stands twice, or once and is free; the terms of a
// sum have the same free indices; the whole is a scalar.
type Tensor interface{ Expr }

// The nodes. Letters are index letters, one byte each, in the order in which they were
// written; an index that stands twice is summed with the metric.
type (
	// TensorValue is a number or a constant.
	TensorValue struct {
		node
		Value field.Elem
	}
	// TensorScalar is a scalar field, background and perturbation together.
	TensorScalar struct {
		node
		Field field.Gen
	}
	// TensorKinetic is X = −½ ∂φ·∂φ of a scalar field.
	TensorKinetic struct {
		node
		Field field.Gen
	}
	// TensorFunction is a free function, or a partial derivative of one, at its arguments.
	TensorFunction struct {
		node
		Fn    *field.FreeFunc
		Index []int
		Args  []Tensor
	}
	// TensorCurvature is R, Ric.ab, Riem.abcd, Weyl.abcd or G.ab.
	TensorCurvature struct {
		node
		Name    string
		Letters string
	}
	// TensorSlice is a quantity of the slices of constant time: N, K, K.ij, R3, R3.ij, Vn or
	// acc.i.
	TensorSlice struct {
		node
		Name    string
		Letters string
	}
	// TensorGrad is X;ab…: the covariant derivative, first by the first letter.
	TensorGrad struct {
		node
		X       Tensor
		Letters string
	}
	// TensorBox is Σ Powers[n] □ⁿ acting on X; the powers' coefficients are constant.
	TensorBox struct {
		node
		Powers []field.Elem
		X      Tensor
	}
	// TensorForm is a form factor F(□) acting on X.
	TensorForm struct {
		node
		Form *FormFactorDecl
		X    Tensor
	}
	// TensorSum is a sum.
	TensorSum struct {
		node
		Terms []Tensor
	}
	// TensorProduct is a product.
	TensorProduct struct {
		node
		Factors []Tensor
	}
	// TensorPower is a scalar to a rational power.
	TensorPower struct {
		node
		X        Tensor
		Exponent *big.Rat
	}
	// TensorElementary is exp, log, sin, cos, tanh or sqrt of a scalar.
	TensorElementary struct {
		node
		Name string
		X    Tensor
	}
)
