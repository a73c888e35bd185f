package rules

// The adm form against the second variation in coordinates: the script takes K_ij from
// (h_ij′ − D_iN_j − D_jN_i)/2N and R3_ij from the Christoffel symbols of h_ij.

import (
	"fmt"
	"math/rand/v2"
	"os"
	"path/filepath"
	"testing"

	"remnant/parse"
	"remnant/parse/diag"
)

// everythingADM has every quantity of the form; the script knows it as "slices".
const everythingADM = `clock cosmic
background a, b
functions F(N, K, R3, Vn)
lagrangian adm = F + b*K.ij*K.jl*K.li + N*R3.ij*K.ij + R3.ij*R3.ij + acc.i*acc.i*K + acc.i*K.ij*acc.j + b'*Vn*K.ij*K.ij
`

// addADM adds a model in its own gauge, the unitary one; its functions of time are drawn.
func (v *variation) addADM(t *testing.T, r numbers, name, text string, sector parse.Sector) {
	t.Helper()
	text = keepLine.ReplaceAllString(text, "")
	text = clockLine.ReplaceAllString(text, fmt.Sprintf("clock %v\nsector %v\n", v.clock, sector))
	m, err := parse.Load(diag.NewSource(name+".act", text), nil)
	if err != nil {
		t.Fatal(err)
	}
	vm := &variationModel{Name: name, Constants: map[string]rational{}, Functions: map[string][]monomial{}, file: m}
	for _, c := range m.Constants {
		vm.Constants[c.Name] = r.number()
	}
	for _, f := range m.Functions {
		vm.Functions[f.Name] = r.polynomial(len(f.Fn.Args))
	}
	for _, b := range m.Background {
		if _, drawn := v.Scalars[b.Name]; !drawn && b.Name != "a" {
			v.Scalars[b.Name] = r.series()
		}
	}
	v.Models = append(v.Models, vm)
}

func TestVariationsOfADM(t *testing.T) {
	const seed = 20260713
	texts := map[string]string{"slices": everythingADM}
	for _, name := range []string{"shearwater", "petrel", "fulmar"} {
		data, err := os.ReadFile(filepath.Join("..", "testdata", name+".act"))
		if err != nil {
			t.Fatal(err)
		}
		texts[name] = string(data)
	}
	r := numbers{rand.New(rand.NewPCG(seed, 1))}
	var cases []*variation
	for _, sector := range []parse.Sector{parse.ScalarSector, parse.VectorSector, parse.TensorSector} {
		for _, clock := range []parse.Clock{parse.Cosmic, parse.Conformal} {
			if clock != parse.Cosmic && sector != parse.ScalarSector {
				continue // the scalars show what a clock does
			}
			v := r.background(clock)
			v.Fields = map[string]taylor{}
			for _, name := range parse.Perturbations(parse.Unitary, sector, nil) {
				v.Fields[name] = r.series()
			}
			for _, name := range []string{"slices", "shearwater", "petrel", "fulmar"} {
				v.addADM(t, r, name, texts[name], sector)
			}
			cases = append(cases, v)
		}
	}
	for i, answers := range ask(t, cases) {
		v := cases[i]
		for _, m := range v.Models {
			got, nonzero := v.equations(t, m), false
			for name, want := range answers[m.Name].Second {
				nonzero = nonzero || want != "0"
				if got[name] == nil || got[name].RatString() != want {
					t.Errorf("seed %d: %s, %v sector, %v clock: the equation of %s is %v from the expansion and %s from coordinates",
						seed, m.Name, m.file.Sector, v.clock, name, got[name], want)
				}
			}
			if !nonzero || len(answers[m.Name].Second) != len(v.Fields) {
				t.Errorf("%s, %v sector: the script gives no equations: %v", m.Name, m.file.Sector, answers[m.Name])
			}
		}
	}
}
