// Package rules holds what is known of perturbations about a spatially flat FLRW background:
// the clocks, the perturbed metric with its connection and curvature to second order, the
// gauges and sectors, and with them the expansion of a covariant or adm Lagrangian to its
// background equations and its quadratic form.
//
// The quadratic action of linear perturbations about FLRW is isotropic, so perturbations that
// depend on time and one coordinate z fix it. Tensors are components in an orthonormal frame
// of that planar geometry, where indices are raised by signs and most components vanish
// identically; each component is a background value plus terms linear and quadratic in the
// jets of the perturbations, all of third order dropped.
package rules
