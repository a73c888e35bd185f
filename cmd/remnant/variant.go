package main

// --gauge and --sector: variants of a covariant or adm model.

import (
	"slices"

	"github.com/spf13/cobra"

	"remnant/parse"
)

// variant holds the flags that choose a gauge and a sector in place of the model's.
type variant struct {
	gauge  string
	sector string
}

// The words of the flags, in the order of their types.
var (
	gaugeNames  = []string{"unitary", "flat", "newtonian", "open"}
	sectorNames = []string{"scalar", "vector", "tensor"}
)

func (v *variant) flags(cmd *cobra.Command) {
	cmd.Flags().StringVar(&v.gauge, "gauge", "", "unitary, flat, newtonian or open, in place of the model's `gauge`")
	cmd.Flags().StringVar(&v.sector, "sector", "", "scalar, vector, tensor or all, in place of the model's `sector`")
}

func (v *variant) check(cmd *cobra.Command) error {
	if cmd.Flags().Changed("gauge") {
		if err := oneOf(cmd, "gauge", v.gauge, gaugeNames...); err != nil {
			return err
		}
	}
	if cmd.Flags().Changed("sector") {
		return oneOf(cmd, "sector", v.sector, append(slices.Clone(sectorNames), "all")...)
	}
	return nil
}

// all reports whether every sector is asked for.
func (v *variant) all() bool { return v.sector == "all" }

// of lists the variants of m that the flags ask for.
func (v *variant) of(m *parse.Model) ([]*parse.Model, error) {
	if v.gauge == "" && v.sector == "" {
		return []*parse.Model{m}, nil
	}
	switch {
	case m.Covariant == nil && m.ADM == nil:
		return nil, &refusal{"a quadratic Lagrangian is in one gauge and sector: --gauge and --sector do not apply to it",
			"they choose the perturbations of a covariant or adm Lagrangian"}
	case m.ADM != nil && v.gauge != "" && v.gauge != "unitary":
		return nil, &refusal{"an adm Lagrangian takes the unitary gauge only: --gauge " + v.gauge + " does not apply to it",
			"its slices are those of uniform scalar"}
	}
	gauge, sectors := m.Gauge, []parse.Sector{m.Sector}
	if v.gauge != "" {
		gauge = parse.Gauge(slices.Index(gaugeNames, v.gauge))
	}
	switch {
	case v.all():
		sectors = []parse.Sector{parse.ScalarSector, parse.VectorSector, parse.TensorSector}
	case v.sector != "":
		sectors = []parse.Sector{parse.Sector(slices.Index(sectorNames, v.sector))}
	}
	var out []*parse.Model
	for _, s := range sectors {
		x := m.Variant(gauge, s)
		if gauge != m.Gauge {
			x.GaugeSpan = m.LagrangianSpan // the file's own choice is not at fault
		}
		out = append(out, x)
	}
	return out, nil
}
