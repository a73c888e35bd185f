package oper

// Division with remainder, greatest common right divisors and least common left multiples:
// K[D] is Euclidean on both sides [Ore1933], [BronsteinPetkovsek1996].

// DivRight finds q and r with a = q·b + r and ord r < ord b. It panics if b is zero.
func DivRight(a, b Oper) (q, r Oper) {
	return divide(a, b, func(part, b Oper) Oper { return part.Mul(b) })
}

// DivLeft finds q and r with a = b·q + r and ord r < ord b. It panics if b is zero.
func DivLeft(a, b Oper) (q, r Oper) {
	return divide(a, b, func(part, b Oper) Oper { return b.Mul(part) })
}

// divide removes the leading coefficient of a step by step; both products lead with the
// product of the leading coefficients.
func divide(a, b Oper, product func(part, b Oper) Oper) (q, r Oper) {
	if b.IsZero() {
		panic("oper: division by the zero operator")
	}
	inv := b.Lead().Inv()
	for a.Order() >= b.Order() {
		n := a.Order()
		part := Mono(a.Lead().Mul(inv), n-b.Order())
		q = q.Add(part)
		a = a.Sub(product(part, b))
		if a.Order() >= n {
			panic("oper: a leading coefficient did not cancel")
		}
	}
	return q, a
}

// Monic is a with leading coefficient 1, by a factor on the left; zero stays zero.
func (a Oper) Monic() Oper {
	if a.IsZero() {
		return a
	}
	return a.Scale(a.Lead().Inv())
}

// GCRD is the monic greatest common right divisor: the operator of highest order of which a
// and b are left multiples. It is zero if both are.
func GCRD(a, b Oper) Oper {
	for !b.IsZero() {
		_, r := DivRight(a, b)
		a, b = b, r.Monic()
	}
	return a.Monic()
}

// LCLM is the monic least common left multiple of a and b, of order ord a + ord b −
// ord gcrd; zero if one of them is. It comes out of the extended Euclidean scheme: the
// cofactors of the vanishing remainder.
func LCLM(a, b Oper) Oper {
	if a.IsZero() || b.IsZero() {
		return Oper{}
	}
	r0, r1 := a, b
	s0, s1 := one(a), Oper{}
	for !r1.IsZero() {
		q, r := DivRight(r0, r1)
		r0, r1, s0, s1 = r1, r, s1, s0.Sub(q.Mul(s1))
	}
	return s1.Mul(a).Monic()
}

// one is the operator 1 of the field of a ≠ 0.
func one(a Oper) Oper { return New(a.Lead().Field().Int(1)) }
