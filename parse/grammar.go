package parse

import _ "embed"

// The published grammar and its examples. Tests check that the grammar is closed, that
// random sentences derived from it parse, and that there is an example for each
// production of a statement or an expression.

//go:embed grammar.ebnf
var grammar string

// Grammar returns the grammar of the notation in EBNF.
func Grammar() string { return grammar }

// Example shows a production of the grammar at work.
type Example struct {
	Production string
	Text       string // a sentence of the production
}

// Examples returns examples for each production of the grammar, in its order.
func Examples() []Example {
	return []Example{
		{"File", "model \"Dunlin\"\nbackground a\nfields u\nlagrangian quadratic = a^3*u'^2/2\n"},
		{"Statement", "keep zeta"},
		{"Model", `model "Plover: two auxiliary fields"`},
		{"Clock", "clock conformal"},
		{"Constants", "constants M > 0, lambda, n"},
		{"Background", "background a, phi, eps > 0"},
		{"Symbol", "eps > 0"},
		{"Functions", "functions V(phi) = m^2*phi^2/2, P(phi, X), f(t), F(t, N, K)"},
		{"Function", "V(phi) = m^2*phi^2/2"},
		{"Argument", "X(chi)"},
		{"FormFactor", "formfactor F(box) = (exp(-box/M^2) - 1)/box"},
		{"Rule", "F.n = 1/(2*n + 1)!"},
		{"Let", "let x = H'/H^2"},
		{"Given", "given H' = -eps*H^2"},
		{"Fields", "fields alpha, psi, zeta"},
		{"Gauge", "gauge unitary"},
		{"Sector", "sector tensor"},
		{"Lagrangian", "lagrangian quadratic = a^3*(zeta'^2 - zeta,i*zeta,i/a^2)"},
		{"Lagrangian", "lagrangian covariant = M^2*R/2 + P(phi, X) - Q(phi, X)*box[phi]"},
		{"Lagrangian", "lagrangian adm = M^2/2*(R3 + K.ij*K.ij - K^2) + F(t, N, K)"},
		{"Keep", "keep v = a*zeta"},
		{"Small", "small eps, eta to order 2"},
		{"Numbers", "numbers M = 1, phi(0) = 27/5, phi'(0) = -1/10^6"},
		{"Equation", "phi'(0) = -1/10^6"},
		{"Sum", "zeta'^2 - zeta,i*zeta,i/a^2"},
		{"Product", "2*a*psi,ii*zeta'/H"},
		{"Signed", "-(box - m^2)[u]"},
		{"Target", "[u]"},
		{"Power", "phi^(3/2)"},
		{"Exponent", "-2"},
		{"Postfix", "(a^2*zeta')'"},
		{"Primary", "V,phi(phi)'"},
		{"Arguments", "(phi, X)"},
		{"Suffix", ",ij"},
		{"Item", "(V,phi) + 1/2"},
		{"ItemProduct", "2*(V,phi)"},
		{"ItemSigned", "-box[u]"},
		{"ItemTarget", "[u]"},
		{"ItemPower", "10^6"},
		{"ItemExponent", "-6"},
		{"ItemPostfix", "phi'"},
		{"ItemPrimary", "phi'(0)"},
		{"ItemSuffix", "'"},
	}
}
