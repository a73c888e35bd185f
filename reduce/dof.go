package reduce

// The independent count of degrees of freedom: how many initial data determine a solution.
//
// The n rows of 𝒟, not reduced in any way, are prolonged by Dʲ for j ≤ N, with their
// coefficients expanded in time along a random background modulo a prime. The jets of order
// above m are eliminated from this linear system; what remains constrains the jets of order up
// to m, so that
//
//	c(m) = n(m+1) − (rank of all rows − rank of their columns of order above m)
//
// is the dimension of the space of m-jets of solutions. With d = max ord 𝒟_pq, N = m + nd is
// enough for the hidden constraints to have surfaced. If c(d+1) = c(d), this is deg Det 𝒟,
// twice the degrees of freedom; if it grows by g, there are g gauge directions and Det 𝒟 = 0.
// The coefficients are expanded before the values are put in: frozen coefficients would
// count wrongly. The cost is one elimination modulo p of a matrix with n(N+1) rows.

import (
	"errors"
	"fmt"
	"math/big"

	"remnant/expr/field"
	"remnant/expr/poly"
)

// Count is what the certificate found.
type Count struct {
	Solutions int // dimension of the solution space, deg Det 𝒟; without meaning if Gauge > 0
	Gauge     int // number of gauge directions
}

// maxUnlucky bounds the random backgrounds that are tried.
const maxUnlucky = 64

// CountSolutions counts the solutions of 𝒟Φ = 0 modulo a prime of 61 bits. The count is
// certain up to a probability of order 10⁻¹⁵.
func (s System) CountSolutions() (Count, error) {
	for seed := uint64(1); seed <= maxUnlucky; seed++ {
		s.K.Budget().Check(0)
		bg := s.K.RandomBackground(primeFor(seed), seed)
		c, err := s.countAlong(bg)
		if errors.Is(err, field.ErrUnlucky) {
			continue
		}
		return c, err
	}
	return Count{}, fmt.Errorf("no regular random background was found in %d tries", maxUnlucky)
}

// primeFor is the prime of the n-th try: 2⁶¹ − 1 first, then others, since a constant such as 3
// may have no root modulo the first.
func primeFor(n uint64) poly.Modulus {
	if n == 1 {
		return poly.Mersenne61
	}
	for p := uint64(1)<<60 + n<<40 + 1; ; p += 2 {
		if new(big.Int).SetUint64(p).ProbablyPrime(0) { // exact below 2⁶⁴
			return poly.Modulus(p)
		}
	}
}

func (s System) countAlong(bg *field.Background) (Count, error) {
	d := max(s.D.Order(), 0)
	c0, err := s.jetsOfSolutions(bg, d)
	if err != nil {
		return Count{}, err
	}
	c1, err := s.jetsOfSolutions(bg, d+1)
	return Count{Solutions: c0, Gauge: c1 - c0}, err
}

// jetsOfSolutions is c(m).
func (s System) jetsOfSolutions(bg *field.Background, m int) (int, error) {
	n, d := len(s.Names), max(s.D.Order(), 0)
	depth := m + n*d
	rows, err := s.prolong(bg, depth)
	if err != nil {
		return 0, err
	}
	low := n * (m + 1) // columns are sorted by order: these are the jets up to m
	high := make([][]uint64, len(rows))
	for i, r := range rows {
		high[i] = append([]uint64(nil), r[low:]...)
	}
	all := rankMod(rows, bg.Modulus(), s.K.Budget().Check)
	above := rankMod(high, bg.Modulus(), s.K.Budget().Check)
	return low - (all - above), nil
}

// prolong gives the rows Dʲ(row), j ≤ depth, at τ = 0; the column of u_b⁽ˡ⁾ is l·n + b.
func (s System) prolong(bg *field.Background, depth int) ([][]uint64, error) {
	n, d, m := len(s.Names), max(s.D.Order(), 0), bg.Modulus()
	series := make([][][]uint64, n*n) // [entry][power of D][derivative]
	for i := range n {
		for j := range n {
			a := s.D.At(i, j)
			for l := 0; l <= a.Order(); l++ {
				c, err := bg.Taylor(a.Coef(l), depth)
				if err != nil {
					return nil, err
				}
				fact := uint64(1)
				for t := range c {
					if t > 1 {
						fact = m.Mul(fact, uint64(t))
					}
					c[t] = m.Mul(c[t], fact)
				}
				series[i*n+j] = append(series[i*n+j], c)
			}
		}
	}
	var rows [][]uint64
	binom := []uint64{1}
	for j := 0; j <= depth; j++ {
		for i := range n {
			row := make([]uint64, n*(depth+d+1))
			for b := range n {
				for l, c := range series[i*n+b] {
					for t := 0; t <= j; t++ { // Dʲ c Dˡ = Σ C(j,t) c⁽ᵗ⁾ D^(l+j−t)
						at := (l+j-t)*n + b
						row[at] = m.Add(row[at], m.Mul(binom[t], c[t]))
					}
				}
			}
			rows = append(rows, row)
		}
		binom = nextBinomials(binom, m)
	}
	return rows, nil
}

func nextBinomials(b []uint64, m poly.Modulus) []uint64 {
	out := make([]uint64, len(b)+1)
	out[0], out[len(b)] = 1, 1
	for i := 1; i < len(b); i++ {
		out[i] = m.Add(b[i-1], b[i])
	}
	return out
}

// rankMod is the rank modulo m; the rows are used up.
func rankMod(rows [][]uint64, m poly.Modulus, check func(int)) int {
	rank := 0
	if len(rows) == 0 {
		return 0
	}
	for c := 0; c < len(rows[0]) && rank < len(rows); c++ {
		check(0)
		p := rank
		for p < len(rows) && rows[p][c] == 0 {
			p++
		}
		if p == len(rows) {
			continue
		}
		rows[rank], rows[p] = rows[p], rows[rank]
		inv := m.Inv(rows[rank][c])
		for i := rank + 1; i < len(rows); i++ {
			if rows[i][c] == 0 {
				continue
			}
			f := m.Mul(rows[i][c], inv)
			for j := c; j < len(rows[i]); j++ {
				if v := rows[rank][j]; v != 0 {
					rows[i][j] = m.Sub(rows[i][j], m.Mul(f, v))
				}
			}
		}
		rank++
	}
	return rank
}
