package oper

import (
	"bytes"
	"encoding/json"
	"math/rand/v2"
	"strings"
	"testing"

	"remnant/expr/field"
	"remnant/expr/outside"
)

// comparison is one line for the script.
type comparison struct {
	Op      string     `json:"op"`
	A       []string   `json:"a"`
	B       []string   `json:"b"`
	Results [][]string `json:"results"`
}

func written(a Oper) []string {
	out := make([]string, a.Order()+1)
	for i := range out {
		out[i] = a.Coef(i).String()
	}
	return out
}

// polynomial is random in t, biased to zero and to single terms.
func (w *world) polynomial(r *rand.Rand) field.Elem {
	var p field.Elem
	for range r.IntN(4) {
		p = p.Add(w.T.Pow(r.IntN(4)).Scale(int64(r.IntN(9)-4), int64(1+r.IntN(2))))
	}
	return p
}

func (w *world) operator(r *rand.Rand, maxOrder int) Oper {
	c := make([]field.Elem, 1+r.IntN(maxOrder+1))
	for i := range c {
		c[i] = w.polynomial(r)
	}
	return New(c...)
}

func TestAgainstSymPy(t *testing.T) {
	const seed = 20250711
	w := newWorld()
	r := rand.New(rand.NewPCG(seed, 1))
	var cases []comparison
	for range 150 {
		a, b := w.operator(r, 3), w.operator(r, 2)
		cases = append(cases, comparison{"product", written(a), written(b), [][]string{written(a.Mul(b))}})
	}
	for range 100 {
		a := w.operator(r, 4)
		cases = append(cases, comparison{"adjoint", written(a), nil, [][]string{written(a.Adjoint())}})
	}
	for i := range 100 {
		a, b := w.operator(r, 2), w.operator(r, 1)
		if i%20 == 0 { // few of these: they are slow in SymPy
			a, b = w.operator(r, 3), w.operator(r, 2)
		}
		if b.IsZero() {
			continue
		}
		q, rem := DivRight(a, b)
		cases = append(cases, comparison{"divide", written(a), written(b), [][]string{written(q), written(rem)}})
	}
	var in bytes.Buffer
	enc := json.NewEncoder(&in)
	for _, c := range cases {
		if c.B == nil {
			c.B = []string{}
		}
		if err := enc.Encode(c); err != nil {
			t.Fatal(err)
		}
	}
	out := strings.Split(strings.TrimSpace(string(outside.SymPy(t, "testdata/operators.py", in.Bytes()))), "\n")
	if len(out) != len(cases) {
		t.Fatalf("%d answers to %d cases", len(out), len(cases))
	}
	for i, answer := range out {
		if answer != "same" {
			t.Errorf("seed %d, %s of %v and %v is %v: %s", seed, cases[i].Op, cases[i].A, cases[i].B, cases[i].Results, answer)
		}
	}

}
