package reduce

// The quadratic form S = ½∫Φᵀ𝒟Φ of a Lagrangian.

import (
	"remnant/expr/field"
	"remnant/expr/oper"
	"remnant/parse"
	"remnant/rules"
)

// System is a quadratic form: 𝒟 = 𝒟† over K[D], with the names of the fields Φ.
type System struct {
	K     *field.Field
	Names []string
	D     oper.Matrix

	form *oper.MatrixNormalForm // where it is known; D may then be left out
}

// Form is the normal form of 𝒟, coefficients in lowest terms.
func (s System) Form() (oper.MatrixNormalForm, error) {
	if s.form != nil {
		return *s.form, nil
	}
	form, err := s.D.NormalForm()
	if err != nil {
		return form, err
	}
	return mapForm(form, func(e field.Elem) (field.Elem, error) { return e.Lowest(), nil })
}

// Matrix is 𝒟, made from the normal form where only that is known.
func (s System) Matrix() oper.Matrix {
	if s.form == nil || s.D.Rows() > 0 {
		return s.D
	}
	return s.form.Matrix(len(s.Names))
}

// mapForm applies fn to every coefficient of a normal form.
func mapForm(m oper.MatrixNormalForm, fn func(field.Elem) (field.Elem, error)) (oper.MatrixNormalForm, error) {
	apply := func(list [][][]field.Elem) ([][][]field.Elem, error) {
		out := make([][][]field.Elem, len(list))
		for n := range list {
			out[n] = make([][]field.Elem, len(list[n]))
			for a, row := range list[n] {
				out[n][a] = make([]field.Elem, len(row))
				for b, c := range row {
					v, err := fn(c)
					if err != nil {
						return nil, err
					}
					out[n][a][b] = v
				}
			}
		}
		return out, nil
	}
	var out oper.MatrixNormalForm
	var err error
	if out.Symmetric, err = apply(m.Symmetric); err != nil {
		return out, err
	}
	out.Antisymmetric, err = apply(m.Antisymmetric)
	return out, err
}

// Quadratic writes the model's Lagrangian as a quadratic form; rules.Form says how.
func Quadratic(m *parse.Model) System {
	s := System{K: m.K, D: rules.Form(m, m.Quadratic, len(m.Fields))}
	for _, f := range m.Fields {
		s.Names = append(s.Names, f.Name)
	}
	return s
}

// index is the place of the field called name; −1 if there is none.
func (s System) index(name string) int {
	for i, n := range s.Names {
		if n == name {
			return i
		}
	}
	return -1
}

// without is the system with the given fields taken out, rows and columns.
func (s System) without(gone ...int) System {
	var keep []int
	out := System{K: s.K}
	for i, n := range s.Names {
		skip := false
		for _, g := range gone {
			skip = skip || g == i
		}
		if !skip {
			keep = append(keep, i)
			out.Names = append(out.Names, n)
		}
	}
	out.D = s.D.Submatrix(keep, keep)
	return out
}

// define adds a field u and a multiplier for λ(u − Σ terms): u is then another name for the
// expression, and the content is unchanged because the (λ,u) block is a unit.
func (s System) define(u, multiplier string, terms []parse.LinearTerm, k field.Elem) System {
	n := len(s.Names)
	out := System{K: s.K, D: oper.NewMatrix(n+2, n+2)}
	out.Names = append(append(out.Names, s.Names...), u, multiplier)
	for i := range n {
		for j := range n {
			out.D.Set(i, j, s.D.At(i, j))
		}
	}
	row := make([]oper.Oper, n+1)
	row[n] = oper.New(s.K.Int(1))
	for _, t := range terms {
		c := t.Coef.Mul(rules.Fourier(k, t.U.Space, 0)).Neg()
		row[t.U.Field] = row[t.U.Field].Add(oper.Mono(c, t.U.Time))
	}
	for j, a := range row {
		out.D.Set(n+1, j, a)
		out.D.Set(j, n+1, a.Adjoint())
	}
	return out
}
