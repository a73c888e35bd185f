// The primes and the pseudorandom points of the modular methods. Both are the same in
// every run.

package poly

import (
	"math/big"
	"sync"
)

// primes is the primes below 2⁶² in decreasing order, as far as they were asked for.
var primes struct {
	sync.Mutex
	list []uint64
}

// primeAt is the i-th of the primes.
func primeAt(i int) uint64 {
	primes.Lock()
	defer primes.Unlock()
	for len(primes.list) <= i {
		c := uint64(1<<62 - 1)
		if n := len(primes.list); n > 0 {
			c = primes.list[n-1] - 2
		}
		// The Baillie–PSW test, to which ProbablyPrime(0) comes down, has no exceptions
		// below 2⁶⁴.
		for !new(big.Int).SetUint64(c).ProbablyPrime(0) {
			c -= 2
		}
		primes.list = append(primes.list, c)
	}
	return primes.list[i]
}

// stream is a deterministic sequence of pseudorandom words (splitmix64, [Steele2014]).
type stream uint64

func (s *stream) next() uint64 {
	*s += 0x9e3779b97f4a7c15
	x := uint64(*s)
	x = (x ^ x>>30) * 0xbf58476d1ce4e5b9
	x = (x ^ x>>27) * 0x94d049bb133111eb
	return x ^ x>>31
}

// element is a pseudorandom element that is not zero.
func (f *primeField) element(s *stream) uint64 {
	for {
		if x := s.next() % f.p; x != 0 {
			return x
		}
	}
}
