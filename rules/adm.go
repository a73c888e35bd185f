package rules

// Actions of the adm form, S = ∫dt d³x N√h L, in the frame: e₀ is the normal of the slices of
// constant time and e₁, e₂, e₃ are tangent to them, so that K_ij = g(e_j, ∇_i e₀) = Γ_ji0 and
// acc_i = g(e_i, ∇₀e₀) = Γ_i00 are components of the connection, Vn = e₀N, and the connection of
// the slices is Γ_kij with spatial indices, whose curvature is R3 (Wald 1984, section 10.2; for
// the action in the perturbations Gleyzes, Langlois, Piazza, Vernizzi 2013, arXiv:1304.4840).
//
// Functions of time are given and not varied; the equations of A and ζ are conditions on them
// and on H. Invariance under a change of the time variable is spent on the choice of the
// slices, so there is no Bianchi identity between the two.

import (
	"remnant/expr/field"
	"remnant/parse"
)

// action is the Lagrangian of the model, of either form.
func (x *expansion) action() parse.Tensor {
	if x.m.ADM != nil {
		return x.m.ADM
	}
	return x.m.Covariant
}

// slice is a quantity of the slices.
func (e *evaluator) slice(n *parse.TensorSlice) labelled {
	name := n.Name
	if n.Letters == "" {
		name = "scalar " + name
	}
	t, ok := e.cache[name]
	if !ok {
		t.tensor = e.sliced(n.Name, n.Letters == "")
		e.cache[name] = t
	}
	return e.selfTrace(labelled{t.tensor, n.Letters})
}

// sliced computes a quantity of the slices, or where it is a tensor its trace.
func (e *evaluator) sliced(name string, isScalar bool) tensor {
	var t tensor
	switch name {
	case "N":
		return scalarTensor(e.perturbedLapse())
	case "Vn":
		return scalarTensor(e.e(0, e.perturbedLapse()))
	case "acc":
		return e.acceleration()
	case "K":
		t = e.extrinsic()
	case "R3":
		t = e.sliceRicci()
	}
	if isScalar {
		return e.trace(t, 0, 1)
	}
	return t
}

// perturbedLapse is N/N̄.
func (f *frame) perturbedLapse() quantity { return f.inv(f.invLapse) }

// acceleration is acc_i = ∂_iN/N, the acceleration of the normal.
func (f *frame) acceleration() tensor {
	out := newTensor(1)
	for i := 1; i < 4; i++ {
		out.set(f.connection.at(i, 0, 0), i)
	}
	return out
}

// extrinsic is K_ij; its trace on the background is three times the physical rate.
func (f *frame) extrinsic() tensor {
	out := newTensor(2)
	for i := 1; i < 4; i++ {
		for j := 1; j < 4; j++ {
			out.set(f.connection.at(j, i, 0), i, j)
		}
	}
	return out
}

// sliceRicci is R3_ij, positive on spheres.
func (f *frame) sliceRicci() tensor {
	out := newTensor(2)
	for i := 1; i < 4; i++ {
		for j := i; j < 4; j++ {
			var sum quantity
			for k := 1; k < 4; k++ {
				if k != i && k != j {
					sum = sum.add(f.curvatureFrom(1, k, i, k, j))
				}
			}
			out.set(sum, i, j)
			out.set(sum, j, i)
		}
	}
	return out
}

// admRank orders what may lead among the background equations of an adm model: functions of
// time that enter them undifferentiated, then functions of time and of the slices, by less
// derivatives first, then H⁽ⁿ⁾ and the rest as elsewhere, with functions of the slices alone where
// undifferentiated functions stand, and last the other functions of time. What depends on time by itself can be chosen for any history
// H(t); in the effective theory of inflation these are Λ(t) and c(t) (Cheung et al. 2008,
// arXiv:0709.0293), for a general L(t, N, K) they are L and L,N.
func (x *expansion) admRank(g field.Gen, eqs []Equation) []int {
	in := x.m.K.Info(g)
	switch {
	case in.Kind == field.Function && in.Order == 0 && in.Name != "a" && in.Name != "H" && in.Name != "t":
		if x.moves(g, eqs) {
			return []int{0, 0, -int(g)}
		}
		return []int{7, 0, -int(g)}
	case in.Kind == field.FreeFunction:
		d := dependenceOf(in)
		switch {
		case d.late || d.sliced > 1:
		case d.onTime && !d.onSlices && !x.moves(g, eqs):
			return []int{7, 0, -int(g)}
		case d.onTime && d.onSlices:
			return []int{6, -d.sliced, -int(g)}
		case d.onSlices:
			return []int{4, -d.sliced, -int(g)}
		}
	}
	return x.rank(g)
}

// dependence says what the function of a jet depends on, and how the jet is differentiated.
type dependence struct {
	onTime, onSlices bool // on functions of time, or t; on N, K, R3 or Vn
	late             bool // differentiated by the former
	sliced           int  // derivatives by the latter
}

func dependenceOf(in field.Info) (d dependence) {
	for i, arg := range in.Fn.Args {
		switch in.Fn.ArgNames[i] {
		case "N", "K", "R3", "Vn":
			d.onSlices = true
			d.sliced += in.Index[i]
		default:
			d.late = d.late || in.Index[i] > 0
			d.onTime = d.onTime || !arg.D().IsZero()
		}
	}
	return d
}

// neededRelation says what would make a background equation solvable.
func (x *expansion) neededRelation() string {
	if x.m.ADM != nil {
		return "a function of time is needed that it fixes, or a relation: given H' = …"
	}
	if len(x.m.Eigenfunctions) > 0 {
		return "conditions on the form factor are needed, such as: given F.1(r1) = 0 and given F(r1) = M^2/(6*r1)"
	}
	return "a relation is needed: given phi' = …"
}

// moves reports whether a derivative of a function of time stands in the equations as derived.
func (x *expansion) moves(g field.Gen, eqs []Equation) bool {
	in := x.m.K.Info(g)
	for _, eq := range eqs {
		for _, h := range eq.Value.Gens() {
			other := x.m.K.Info(h)
			switch {
			case h == g || other.Kind != in.Kind:
			case in.Kind == field.Function && x.m.K.Base(h) == x.m.K.Base(g),
				in.Kind == field.FreeFunction && other.Fn == in.Fn:
				return true
			}
		}
	}
	return false
}
