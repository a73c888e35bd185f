package poly

import (
	"encoding/json"
	"math/big"
	"testing"

	"remnant/expr/outside"
)

// The differential test: hundreds of random cases, answered by SymPy
// (sympy.polys.rings) in one process.

// question is a case as testdata/sympy_check.py reads it.
type question struct {
	Op   string      `json:"op"`
	N    int         `json:"n"`
	Args [][]jsonRow `json:"args"`
}

// jsonRow is [coefficient, exponents].
type jsonRow [2]any

// drawPoly is a random polynomial in n variables; one coefficient in eight is large.
func drawPoly(s *stream, n, terms, degree int) Poly {
	var ts []Term
	for range terms {
		c := big.NewInt(int64(s.next()%199) - 99)
		if s.next()%8 == 0 {
			c.Lsh(c, uint(s.next()%90))
		}
		var m []Power
		for v := range n {
			if e := uint32(s.next() % uint64(degree+1)); e > 0 {
				m = append(m, Power{Var(v), e})
			}
		}
		ts = append(ts, Term{c, m})
	}
	return FromTerms(ts)
}

func jsonRows(p Poly, n int) []jsonRow {
	out := []jsonRow{}
	for m, c := range p.Terms() {
		e := make([]uint32, n)
		for _, x := range m {
			e[x.Var] = x.Exp
		}
		out = append(out, jsonRow{c.String(), e})
	}
	return out
}

// fromRows reads a polynomial of an answer.
func fromRows(t *testing.T, raw json.RawMessage) Poly {
	var in [][2]json.RawMessage
	if err := json.Unmarshal(raw, &in); err != nil {
		t.Fatal(err)
	}
	var ts []Term
	for _, r := range in {
		var c string
		var e []uint32
		if json.Unmarshal(r[0], &c) != nil || json.Unmarshal(r[1], &e) != nil {
			t.Fatalf("unreadable row %s", raw)
		}
		x, _ := new(big.Int).SetString(c, 10)
		var m []Power
		for v, k := range e {
			m = append(m, Power{Var(v), k})
		}
		ts = append(ts, Term{x, m})
	}
	return FromTerms(ts)
}

// drawQuestions makes the cases; each comes with the operands.
func drawQuestions(n int) (qs []question, args [][]Poly) {
	s := stream(20)
	put := func(op string, n int, ps ...Poly) {
		q := question{Op: op, N: n}
		for _, p := range ps {
			q.Args = append(q.Args, jsonRows(p, n))
		}
		qs, args = append(qs, q), append(args, ps)
	}
	for i := range n {
		v := 1 + i%4
		f, g, h := drawPoly(&s, v, 5, 3), drawPoly(&s, v, 5, 3), drawPoly(&s, v, 3, 2)
		if f.IsZero() || g.IsZero() || h.IsZero() {
			continue
		}
		put("mul", v, f, g)
		put("div", v, f.Mul(g), g)
		put("div", v, f.Mul(g).Add(h), g)
		put("gcd", v, f.Mul(h), g.Mul(h))
		put("gcd", v, f, g)
		put("squarefree", v, f.Mul(h).Mul(h))
	}
	return qs, args
}

func TestAgainstSymPy(t *testing.T) {
	qs, args := drawQuestions(60)
	in, err := json.Marshal(qs)
	if err != nil {
		t.Fatal(err)
	}
	out := outside.SymPy(t, "testdata/sympy_check.py", in)
	var answers []json.RawMessage
	if err := json.Unmarshal(out, &answers); err != nil || len(answers) != len(qs) {
		t.Fatalf("%d answers to %d questions: %v", len(answers), len(qs), err)
	}
	for i, q := range qs {
		compareAnswer(t, q.Op, args[i], answers[i])
	}
	t.Logf("%d cases", len(qs))
}

// compareAnswer compares our result with SymPy's, up to a sign for gcds and factors.
func compareAnswer(t *testing.T, op string, args []Poly, answer json.RawMessage) {
	var got Poly
	switch op {
	case "mul":
		got = args[0].Mul(args[1])
	case "gcd":
		got = Gcd(args[0], args[1])
	case "div":
		q, ok := args[0].DivExact(args[1])
		if ok != (string(answer) != "null") {
			t.Errorf("%v divides %v: %v, SymPy says %s", args[1], args[0], ok, answer)
		}
		if !ok {
			return
		}
		got = q
	case "squarefree":
		compareFactors(t, args[0], answer)
		return
	}
	want := fromRows(t, answer)
	if op == "gcd" {
		want = want.positive()
	}
	if !got.Equal(want) {
		t.Errorf("%s of %v: %v, SymPy says %v", op, args, got, want)
	}
}

func compareFactors(t *testing.T, p Poly, answer json.RawMessage) {
	var in [][2]json.RawMessage
	if err := json.Unmarshal(answer, &in); err != nil {
		t.Fatal(err)
	}
	got := p.SquareFree()
	if len(got) != len(in) {
		t.Errorf("%v: factors %v, SymPy says %s", p, got, answer)
		return
	}
	for i, f := range in {
		if want := fromRows(t, f[0]).positive(); !got[i].Poly.Equal(want) || string(f[1]) != big.NewInt(int64(got[i].Exp)).String() {
			t.Errorf("%v: factor %v, SymPy says %v to the %s", p, got[i], want, f[1])
		}
	}
}
