package reduce

import (
	"errors"
	"math/big"
	"slices"
	"strings"
	"testing"

	"remnant/parse/diag"
)

func polesOf(t *testing.T, form, numbers string, radius int64, order int) *Poles {
	t.Helper()
	text := strings.Replace(flat, "formfactor F(box)\n", "constants c, d\nformfactor F(box)"+form+"\n", 1) + "numbers " + numbers + "\n"
	r := mustReduce(t, model(t, "siskin.act", text))
	p, err := r.Poles(big.NewRat(radius, 1), order)
	if err != nil {
		t.Fatal(err)
	}
	return p
}

func rat(a, b int64) *big.Rat { return big.NewRat(a, b) }

// W = 1 − 6sF(s) for M = 1 on flat space.
func TestPolesOfFormFactors(t *testing.T) {
	tests := []struct {
		why, form, numbers string
		radius             int64
		at                 []*big.Rat // real zeros, exact
		verdicts           [][]PoleVerdict
	}{
		{"the scalaron s = M²/(6f₀) is healthy for f₀ > 0: De Felice, Tsujikawa 2010, arXiv:1002.4928", " = c", "M = 1, c = 1/12", 10,
			[]*big.Rat{rat(2, 1)}, [][]PoleVerdict{{Healthy}}},
		{"for f₀ < 0 it is a tachyon", " = c", "M = 1, c = -1/12", 10,
			[]*big.Rat{rat(-2, 1)}, [][]PoleVerdict{{Healthy, Tachyon}}},
		{"two poles of a fourth-order theory: one is a ghost (Ostrogradsky)", " = c + d*box", "M = 1, c = 1/4, d = -1/12", 10,
			[]*big.Rat{rat(1, 1), rat(2, 1)}, [][]PoleVerdict{{Healthy}, {GhostPole}}}, // 1 − 3s/2 + s²/2
		{"an exponential adds no pole", " = (1 - (1 - box/2)*exp(-box/5))/(6*box)", "M = 1", 1000,
			[]*big.Rat{rat(2, 1)}, [][]PoleVerdict{{Healthy}}},
		{"none at all: W = exp(−s)", " = (1 - exp(-box))/(6*box)", "M = 1", 1000, nil, nil},
		{"a double zero is multiple", " = c + d*box", "M = 1, c = 1/3, d = -1/6", 10,
			[]*big.Rat{rat(1, 1)}, [][]PoleVerdict{{MultiplePole}}}, // (1 − s)²
		{"a complex pair: 1 + s²", " = d*box", "M = 1, d = -1/6", 10,
			[]*big.Rat{nil, nil}, [][]PoleVerdict{{ComplexPair}, {ComplexPair}}},
	}
	for _, tc := range tests {
		t.Run(tc.why, func(t *testing.T) {
			p := polesOf(t, tc.form, tc.numbers, tc.radius, 0)
			if !p.Zeros.Proven || len(p.List) != len(tc.verdicts) {
				t.Fatalf("%s: zeros %+v, want %d", p.Function, p.List, len(tc.verdicts))
			}
			for i, z := range p.List {
				if !slices.Equal(z.Verdicts, tc.verdicts[i]) {
					t.Errorf("zero at %v: %v, want %v", z.Re, z.Verdicts, tc.verdicts[i])
				}
				if want := tc.at[i]; want != nil && new(big.Rat).Abs(new(big.Rat).Sub(z.Re, want)).Cmp(z.Radius) > 0 {
					t.Errorf("zero at %v ± %v, want %v", z.Re, z.Radius, want)
				}
			}
		})
	}
}

// A rule for the Taylor coefficients: F = (1 − sin(√s)/√s)/(6s) makes W = sin(√s)/√s, with zeros
// at n²π².
func TestPolesOfRule(t *testing.T) {
	p := polesOf(t, ": F.n = (-1)^n/(6*(2*n+3)!)", "M = 1", 50, 0)
	if !p.Zeros.Proven || p.Zeros.Count != 2 {
		t.Fatalf("%d zeros of %s, want π² and 4π²", p.Zeros.Count, p.Function)
	}
	for i, want := range []string{"9.8696044010893586", "39.478417604357434"} {
		w, _ := new(big.Rat).SetString(want)
		z := p.List[i]
		if new(big.Rat).Abs(new(big.Rat).Sub(z.Re, w)).Cmp(new(big.Rat).Add(z.Radius, rat(1, 1e14))) > 0 || !z.Real {
			t.Errorf("zero at %s ± %s, want %s", Decimal(z.Re, 17), Decimal(z.Radius, 2), want)
		}
	}
}

// The truncation of W = exp(−s) after s⁸ has eight zeros, and all of them are artefacts.
func TestTruncationArtefacts(t *testing.T) {
	p := polesOf(t, " = (1 - exp(-box))/(6*box)", "M = 1", 20, 8)
	if p.Zeros.Count != 0 || len(p.TruncationArtefacts) != 8 {
		t.Errorf("%d zeros and %d artefacts, want none and 8", p.Zeros.Count, len(p.TruncationArtefacts))
	}
}

func TestPolesAreRefused(t *testing.T) {
	tests := []struct{ why, form, numbers, want string }{
		{"a free form factor", "", "M = 1", "is free"},
		{"a number is missing", " = c", "M = 1", "a number is missing for 'c'"},
		{"a pole where the background needs it analytic", " = 1/box", "M = 1", "not analytic"},
		{"coefficients without a bound", ": F.n = 2^n", "M = 1", "do not fall"},
	}
	for _, tc := range tests {
		text := strings.Replace(flat, "formfactor F(box)\n", "constants c, d\nformfactor F(box)"+tc.form+"\n", 1) + "numbers " + tc.numbers + "\n"
		r := mustReduce(t, model(t, "siskin.act", text))
		_, err := r.Poles(rat(10, 1), 0)
		var list diag.List
		if !errors.As(err, &list) || !strings.Contains(list[0].Summary, tc.want) {
			t.Errorf("%s: %v, want a refusal that says %q", tc.why, err, tc.want)
		}
	}
}
