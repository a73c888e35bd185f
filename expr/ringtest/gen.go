// Generators of numbers where arithmetic goes wrong: zero, units, the ends of a word.

package ringtest

import (
	"math"
	"math/big"

	"pgregory.net/rapid"
)

// Small is an integer that is 0, 1 or −1 more often than not, else of one or two digits.
func Small() *rapid.Generator[int64] {
	return rapid.OneOf(rapid.Int64Range(-1, 1), rapid.Int64Range(-1, 1), rapid.Int64Range(-99, 99))
}

// Edge is an integer within a few units of 0, ±2³¹, ±2³² or ±2⁶³, or anywhere.
func Edge() *rapid.Generator[*big.Int] {
	return rapid.Custom(func(t *rapid.T) *big.Int {
		near := rapid.SampledFrom([]float64{0, 0, 31, 32, 62, 63, 64, -31, -32, -62, -63, -64}).Draw(t, "near")
		x := new(big.Int)
		if near != 0 {
			x.Lsh(big.NewInt(1), uint(math.Abs(near)))
		}
		if near < 0 {
			x.Neg(x)
		}
		return x.Add(x, big.NewInt(rapid.Int64Range(-3, 3).Draw(t, "off")))
	})
}

// Integer is an integer of any of these kinds, or with some hundred bits.
func Integer() *rapid.Generator[*big.Int] {
	wide := rapid.Custom(func(t *rapid.T) *big.Int {
		x := big.NewInt(rapid.Int64().Draw(t, "high"))
		x.Lsh(x, uint(rapid.IntRange(0, 200).Draw(t, "shift")))
		return x.Add(x, big.NewInt(rapid.Int64().Draw(t, "low")))
	})
	small := rapid.Map(Small(), big.NewInt)
	return rapid.OneOf(small, small, Edge(), wide)
}
