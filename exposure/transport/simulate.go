package transport

import (
	"halfvalue/exposure/transport/internal/photon"
	"halfvalue/materials"
)

// Simulation runs the Monte Carlo itself, for checks and reports. It takes
// tenths of a second and more where the tables take microseconds.
type Simulation struct {
	Histories       int     // first collisions; 40000 gives about 1 % at 5 mean free paths
	Seed            uint64  // same seed, same result, whatever the workers
	Workers         int     // 0: 1
	Cosine          float64 // of the beam against the normal; 0: 1, straight in
	WithoutCoherent bool    // mean free paths without coherent scattering, as many published figures
	FreeElectrons   bool    // electrons scatter by Klein and Nishina at all angles
}

// Simulated is what a run finds behind a slab, per incident photon/cm2.
type Simulated struct {
	Primary, Scattered float64 // air kerma, pGy cm2
	MeanKeV            float64 // of the scattered fluence
	RelErr             float64 // one sigma of Scattered, relative
}

// Slab runs a plane-parallel beam of photons above 10 to 3000 keV through layers.
func (s Simulation) Slab(layers []Layer, keV, perCM2 []float64) (Simulated, error) {
	if err := checkLayers(layers); err != nil {
		return Simulated{}, err
	}
	if err := checkSpectrum(keV, perCM2); err != nil {
		return Simulated{}, err
	}
	run := photon.Slab{Histories: s.Histories, Seed: s.Seed, Workers: s.Workers, Cosine: s.Cosine}
	for i, e := range keV {
		if e > CutKeV && perCM2[i] > 0 {
			run.KeV, run.Weight = append(run.KeV, e), append(run.Weight, perCM2[i])
		}
	}
	for _, l := range layers {
		med, err := photon.NewMediumOf(l.Material, s.WithoutCoherent, s.FreeElectrons)
		if err != nil {
			return Simulated{}, err
		}
		run.Layers = append(run.Layers, photon.Layer{Medium: med, GPerCM2: l.MM * l.Material.DensityGPerCM3() / 10})
	}
	r, err := run.Run()
	if err != nil {
		return Simulated{}, err
	}
	out := Simulated{Primary: r.Primary[0], Scattered: r.Planes[0].Kerma, RelErr: r.RelErr[0]}
	var flux float64
	for i, f := range r.Planes[0].Flux {
		flux += f
		out.MeanKeV += r.Planes[0].FluxKeV[i]
	}
	if flux > 0 {
		out.MeanKeV /= flux
	}
	return out, nil
}

// BuildUp runs a point source in an endless medium and gives the air-kerma
// build-up factor and its relative error (one sigma) at radii in mean free paths.
func (s Simulation) BuildUp(m *materials.Material, keV float64, radiiMFP []float64) (factor, relErr []float64, err error) {
	med, err := photon.NewMediumOf(m, s.WithoutCoherent, s.FreeElectrons)
	if err != nil {
		return nil, nil, err
	}
	b, err := photon.Sphere{Medium: med, KeV: keV, RadiiMFP: radiiMFP, Histories: s.Histories, Seed: s.Seed, Workers: s.Workers}.Run()
	if err != nil {
		return nil, nil, err
	}
	for _, v := range b {
		factor, relErr = append(factor, v.Factor), append(relErr, v.RelErr)
	}
	return factor, relErr, nil
}
