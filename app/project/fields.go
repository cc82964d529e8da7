package project

// field ties a key of the file to the place in a Project that holds its value,
// so that reading, writing and checking speak of the same keys in the same
// order. The type of to says what the value is.
type field struct {
	key      string
	to       any
	required bool // no default: the entry means nothing without it
}

// fielder is an object of the file that is a plain list of keys.
type fielder interface{ fields() []field }

func (a *Air) fields() []field {
	return []field{
		{key: "temperature_c", to: &a.TemperatureC},
		{key: "relative_humidity_pct", to: &a.RelativeHumidityPct},
		{key: "pressure_kpa", to: &a.PressureKPa},
	}
}

// fields lists the dimensions; the surfaces follow them in the file.
func (r *Room) fields() []field {
	return []field{
		{key: "length_m", to: &r.Length, required: true},
		{key: "width_m", to: &r.Width, required: true},
		{key: "height_m", to: &r.Height, required: true},
	}
}

func (s *FinishShare) fields() []field {
	return []field{
		{key: "finish", to: &s.Finish, required: true},
		{key: "share", to: &s.Share},
	}
}

// fields lists the texts; the absorption follows them in the file.
func (f *Finish) fields() []field {
	return []field{
		{key: "id", to: &f.ID, required: true},
		{key: "name", to: &f.Name},
		{key: "source", to: &f.Source},
	}
}

func (l *Loudspeaker) fields() []field {
	return []field{
		{key: "id", to: &l.ID},
		{key: "at_m", to: &l.At, required: true},
		{key: "gain_db", to: &l.GainDB},
		{key: "delay_ms", to: &l.DelayMS},
		{key: "inverted", to: &l.Inverted},
	}
}

func (s *Seat) fields() []field {
	return []field{
		{key: "id", to: &s.ID},
		{key: "at_m", to: &s.At, required: true},
	}
}

// fields lists what all kinds share; the block of the kind follows.
func (a *Absorber) fields() []field {
	return []field{
		{key: "id", to: &a.ID},
		{key: "kind", to: &a.Kind, required: true},
		{key: "surface", to: &a.Surface, required: true},
		{key: "centre_m", to: &a.Centre, required: true},
		{key: "size_m", to: &a.Size, required: true},
		{key: "units", to: &a.Units},
	}
}

// block returns the block of the absorber's kind, or nil where it is missing
// or the kind is unknown.
func (a *Absorber) block() fielder {
	for _, b := range a.blocks() {
		if b.kind == a.Kind && b.set {
			return b.fielder
		}
	}
	return nil
}

// kindBlock is one kind's block of an absorber and whether it is set.
type kindBlock struct {
	kind    string
	set     bool
	fielder fielder
}

// blocks lists the blocks of all kinds in the order of Kinds.
func (a *Absorber) blocks() []kindBlock {
	return []kindBlock{
		{"neck", a.Neck != nil, a.Neck},
		{"panel", a.Panel != nil, a.Panel},
		{"perforated", a.Perforated != nil, a.Perforated},
		{"slotted", a.Slotted != nil, a.Slotted},
		{"microperforated", a.Microperforated != nil, a.Microperforated},
		{"porous", a.Porous != nil, a.Porous},
	}
}

func (n *Neck) fields() []field {
	return []field{
		{key: "cavity_l", to: &n.CavityL},
		{key: "mouth_diameter_mm", to: &n.MouthDiameterMM},
		{key: "length_mm", to: &n.LengthMM},
		{key: "mouths", to: &n.Mouths},
		{key: "gauze_pa_s_m", to: &n.GauzePaSM},
		{key: "fill", to: &n.Fill},
	}
}

func (f *NeckFill) fields() []field {
	return []field{
		{key: "share", to: &f.Share},
		{key: "flow_pa_s_m2", to: &f.FlowPaSM2},
	}
}

func (p *Panel) fields() []field {
	return []field{
		{key: "mass_kg_m2", to: &p.MassKgM2},
		{key: "thickness_mm", to: &p.ThicknessMM},
		{key: "youngs_gpa", to: &p.YoungsGPa},
		{key: "poisson", to: &p.Poisson},
		{key: "loss_factor", to: &p.LossFactor},
		{key: "cavity_mm", to: &p.CavityMM},
		{key: "edge_pa_s_m", to: &p.EdgePaSM},
		{key: "fill", to: &p.Fill},
	}
}

func (p *Perforated) fields() []field {
	return []field{
		{key: "panel_mm", to: &p.PanelMM},
		{key: "hole_mm", to: &p.HoleMM},
		{key: "pitch_mm", to: &p.PitchMM},
		{key: "cavity_mm", to: &p.CavityMM},
		{key: "partitioned", to: &p.Partitioned},
		{key: "fill", to: &p.Fill},
		{key: "gauze_pa_s_m", to: &p.GauzePaSM},
	}
}

func (s *Slotted) fields() []field {
	return []field{
		{key: "slat_mm", to: &s.SlatMM},
		{key: "slot_mm", to: &s.SlotMM},
		{key: "panel_mm", to: &s.PanelMM},
		{key: "cavity_mm", to: &s.CavityMM},
		{key: "partitioned", to: &s.Partitioned},
		{key: "fill", to: &s.Fill},
	}
}

func (m *Microperforated) fields() []field {
	return []field{
		{key: "panel_mm", to: &m.PanelMM},
		{key: "hole_mm", to: &m.HoleMM},
		{key: "pitch_mm", to: &m.PitchMM},
		{key: "cavity_mm", to: &m.CavityMM},
		{key: "partitioned", to: &m.Partitioned},
	}
}

func (p *Porous) fields() []field {
	return []field{
		{key: "thickness_mm", to: &p.ThicknessMM},
		{key: "flow_pa_s_m2", to: &p.FlowPaSM2},
		{key: "gap_mm", to: &p.GapMM},
		{to: &p.Fluid},
	}
}

func (f *Fill) fields() []field {
	return []field{
		{key: "thickness_mm", to: &f.ThicknessMM},
		{key: "flow_pa_s_m2", to: &f.FlowPaSM2},
		{key: "at", to: (*fillSide)(&f.AtFace)},
		{to: &f.Fluid},
	}
}

// fillSide is Fill.AtFace as the file writes it.
type fillSide bool

func (s fillSide) String() string {
	if s {
		return "face"
	}
	return "wall"
}

func (f *Fluid) fields() []field {
	return []field{
		{key: "porosity", to: &f.Porosity},
		{key: "tortuosity", to: &f.Tortuosity},
		{key: "viscous_um", to: &f.ViscousUM},
		{key: "thermal_um", to: &f.ThermalUM},
	}
}

// The field types that reading, writing and checking handle are *float64, *int,
// *bool, *string, *acoustics.Surface, *acoustics.Point, *[2]float64, *fillSide,
// **Fill, **NeckFill, and **Fluid, whose keys stand among those of the object
// that has it.
