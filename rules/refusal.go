package rules

// Refusals of a covariant model that the notation accepts.

import "remnant/parse/diag"

const (
	// VanishingBackground: a denominator or a radicand that is zero on the background.
	//
	// Example:
	//	background a, phi
	//	gauge flat
	//	lagrangian covariant = R/2 + 1/(phi;a*phi;b*Weyl.acbd*Ric.cd)
	VanishingBackground diag.Kind = "zero on the background"

	// IncompleteGauge: a gauge that the background does not allow.
	//
	// Example:
	//	constants L
	//	background a
	//	gauge unitary
	//	lagrangian covariant = R/2 - L
	IncompleteGauge diag.Kind = "gauge cannot be taken"

	// NoSolution: the declared background does not solve the background equations.
	//
	// Example:
	//	background a, phi
	//	functions V(phi)
	//	given H' = 0
	//	given phi' = 1
	//	gauge flat
	//	lagrangian covariant = R/2 + X - V
	NoSolution diag.Kind = "background does not solve the equations"

	// NoLeader: a background equation that can be solved for nothing.
	//
	// Example:
	//	constants M > 0, r > 0
	//	formfactor F(box)
	//	background a
	//	given box[R] = r*R
	//	lagrangian covariant = M^2*R/2 + R*F(box)[R]/2
	NoLeader diag.Kind = "background equation has no leader"

	// NoEigenfunction: a form factor acts on what is no eigenfunction of □ on the background.
	//
	// Example:
	//	background a
	//	formfactor F(box)
	//	lagrangian covariant = R/2 + R*F(box)[R]
	NoEigenfunction diag.Kind = "no eigenfunction of box"
)
