package parse

// What an adm model has beside its Lagrangian: its gauge, its perturbations, and functions of
// quantities of the slices.

import (
	"testing"

	"remnant/expr/field"
	"remnant/parse/diag"
)

func loadADM(t *testing.T, text string) *Model {
	t.Helper()
	m, err := Load(diag.NewSource("test.act", text), nil)
	if err != nil {
		t.Fatal(err)
	}
	return m
}

func TestPerturbationsOfADM(t *testing.T) {
	m := loadADM(t, "background a, phi, b\nlagrangian adm = R3 + phi'*K - b\n")
	if m.ADM == nil || m.Covariant != nil || m.Gauge != Unitary || len(m.Scalars()) != 0 {
		t.Errorf("form %v and %v, gauge %v, scalars %v", m.ADM, m.Covariant, m.Gauge, m.Scalars())
	}
	want := []string{"A", "B", "zeta"}
	if len(m.Fields) != len(want) {
		t.Fatalf("fields %v, want %v", m.Fields, want)
	}
	for i, f := range m.Fields {
		if f.Name != want[i] {
			t.Errorf("field %d is %s, want %s", i, f.Name, want[i])
		}
	}
}

// The chain rule along the background, where N is 1 and K three times the physical rate, by
// the time of each clock.
func TestFunctionsAlongTheBackground(t *testing.T) {
	for clock, want := range map[string]string{
		"cosmic":    "F,t + 3*H'*F,K",
		"conformal": "a*F,t + 3*(H/a)'*F,K",
		"efolds":    "F,t/H + 3*H'*F,K",
	} {
		m := loadADM(t, "clock "+clock+"\nbackground a\nfunctions F(t, N, K, R3, Vn)\nlagrangian adm = F\n")
		value := func(text string) field.Elem {
			v, err := m.Evaluate(diag.NewSource("test", text))
			if err != nil {
				t.Fatal(err)
			}
			return v
		}
		if got := value("F'"); !got.Equal(value(want)) {
			t.Errorf("%s: F' = %v, want %s", clock, got, want)
		}
	}
}

// A definition keeps N and K apart until their background values are put in.
func TestDefinitionsOnTheBackground(t *testing.T) {
	m := loadADM(t, "constants b\nbackground a\nfunctions F(N, K) = b*K^2/N\nlagrangian adm = F\n")
	f := &m.Functions[0]
	want, err := m.Evaluate(diag.NewSource("test", "9*b*H^2"))
	if err != nil {
		t.Fatal(err)
	}
	if !f.Value.Equal(want) || len(f.StandIns) != 2 || f.Formal.Equal(want) {
		t.Errorf("the value is %v of %v with stand-ins %v, want %v", f.Value, f.Formal, f.StandIns, want)
	}
	src := diag.NewSource("test.act", "background a\nfunctions F(N) = 1/(N - 1)\nlagrangian adm = F\n")
	if _, err := Load(src, nil); err == nil {
		t.Error("a definition that is singular on the background is not refused")
	}
}
