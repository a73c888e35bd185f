package rules

import (
	"os"
	"path/filepath"
	"testing"

	"remnant/parse"
	"remnant/parse/diag"
)

func load(t testing.TB, text string) *parse.Model {
	t.Helper()
	m, err := parse.Load(diag.NewSource("case.act", text), nil)
	if err != nil {
		t.Fatal(err)
	}
	return m
}

// lagrangians are of every kind that the covariant form has.
var lagrangians = map[string]string{
	"canonical":         "constants M > 0\nfunctions V(phi)\nbackground a, phi\nlagrangian covariant = M^2*R/2 + X - V\n",
	"kinetic":           "constants M > 0\nfunctions P(phi, X)\nbackground a, phi\nlagrangian covariant = M^2*R/2 + P\n",
	"cubic":             "constants M > 0\nfunctions P(phi, X), Q(phi, X)\nbackground a, phi\nlagrangian covariant = M^2*R/2 + P - Q*box[phi]\n",
	"quartic":           "functions P(phi, X), F(phi, X)\nbackground a, phi\nlagrangian covariant = P + F*R + F,X*(box[phi]^2 - phi;ab*phi;ab)\n",
	"quintic":           "functions P(phi, X), F(phi, X)\nbackground a, phi\nlagrangian covariant = R/2 + P + F*G.ab*phi;ab - F,X/6*(box[phi]^3 - 3*box[phi]*phi;ab*phi;ab + 2*phi;ab*phi;bc*phi;ca)\n",
	"Gauss–Bonnet":      "functions V(phi), f(phi)\nbackground a, phi\nlagrangian covariant = R/2 + X - V + f*(Riem.abcd*Riem.abcd - 4*Ric.ab*Ric.ab + R^2)\n",
	"f(GB)":             "constants M > 0\nbackground a\nfunctions f(GB)\nlagrangian covariant = M^2*R/2 + f\n",
	"f(R)":              "background a\nfunctions f(R)\nlagrangian covariant = f\n",
	"curvature squared": "constants M > 0, b, c\nbackground a\nlagrangian covariant = M^2*R/2 + b*R^2 + c*Weyl.abcd*Weyl.abcd\n",
	"two scalars":       "constants M > 0\nfunctions V(phi, chi), P(X(chi))\nbackground a, phi, chi\nlagrangian covariant = M^2*R/2 + X(phi) + P - V\n",
	"degenerate":        "constants c\nfunctions P(phi, X), V(phi)\nbackground a, phi\nlagrangian covariant = R/2 + X - V + c*phi;a*phi;ab*phi;bc*phi;c\n",
	"derivative of R":   "constants b\nfunctions V(phi)\nbackground a, phi\nlagrangian covariant = R/2 + X - V + b*R;a*phi;a\n",
}

// The Noether identities hold for every kind of Lagrangian, on every clock and in the scalar
// and the vector sector.
func TestNoether(t *testing.T) {
	for name, text := range lagrangians {
		for _, header := range []string{"clock cosmic\n", "clock conformal\n", "clock efolds\n", "sector vector\n"} {
			t.Run(name+"/"+header, func(t *testing.T) {
				ids, err := CheckGauge(load(t, header+text))
				if err != nil {
					t.Fatal(err)
				}
				if len(ids) == 0 {
					t.Fatal("nothing was checked")
				}
				for _, id := range ids {
					for i, left := range id.Left {
						if !left.IsZero() {
							t.Errorf("direction %s: in the equation of %s is left %v", id.Parameter, id.Fields[i], left)
						}
					}
				}
			})
		}
	}
}

// The check fails on an action that is no scalar: one term of the expansion is changed.
func TestNoetherFails(t *testing.T) {
	m := load(t, lagrangians["canonical"])
	x, err := Expand(m.Variant(parse.Open, parse.ScalarSector))
	if err != nil {
		t.Fatal(err)
	}
	for i := range x.Model.Quadratic {
		terms := append([]parse.Term(nil), x.Model.Quadratic...)
		terms[i].Coef = terms[i].Coef.Scale(2, 1)
		d := Form(x.Model, terms, 5)
		wrong := false
		for _, g := range generators(m) {
			for r := range 5 {
				s := d.At(r, 0).Mul(g.change["A"])
				for j, n := range []string{"B", "zeta", "E", "dphi"} {
					s = s.Add(d.At(r, j+1).Mul(g.change[n]))
				}
				wrong = wrong || !s.IsZero()
			}
		}
		if !wrong {
			t.Errorf("doubling term %d (%v %v) goes unnoticed", i, terms[i].U, terms[i].V)
		}
	}
}

// The Noether identities hold for every shipped model that names no frame of its own.
func TestNoetherOfShippedModels(t *testing.T) {
	files, err := filepath.Glob("../testdata/*.act")
	if err != nil || len(files) == 0 {
		t.Fatal("no shipped models", err)
	}
	checked := 0
	for _, file := range files {
		text, err := os.ReadFile(file)
		if err != nil {
			t.Fatal(err)
		}
		m := load(t, string(text))
		if m.Covariant == nil {
			continue
		}
		checked++
		for _, s := range []parse.Sector{parse.ScalarSector, parse.VectorSector} {
			ids, err := CheckGauge(m.Variant(m.Gauge, s))
			if err != nil || len(ids) == 0 {
				t.Errorf("%s, %s sector: %d identities, %v", file, s, len(ids), err)
			}
			for _, id := range ids {
				if !id.Holds() {
					t.Errorf("%s, %s sector: direction %s does not hold", file, s, id.Parameter)
				}
			}
		}
	}
	if checked < 8 {
		t.Errorf("%d covariant models were checked", checked)
	}
}
