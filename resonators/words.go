package resonators

// Words says what one step of the dimension is, as "cavity 1 mm deeper".
func (s Sensitivity) Words() string {
	switch s.Dimension {
	case "Volume":
		return "1 L more air in the box"
	case "MouthRadius":
		return "mouth 1 mm more in radius"
	case "Length":
		return "neck 1 mm longer"
	case "Gauze":
		return "gauze 10 Pa·s/m more"
	case "FillShare":
		return "1 % more of the box filled"
	case "FillFlow", "Fill.FlowResistivity":
		return "flow resistivity 1000 Pa·s/m² more"
	case "Fill.Thickness":
		return "fill 1 mm thicker"
	case "Mass":
		return "sheet 0.1 kg/m² heavier"
	case "Edge":
		return "edge loss 10 Pa·s/m more"
	case "Thickness":
		return "sheet 0.1 mm thicker, at the same mass"
	case "Youngs":
		return "Young's modulus 0.1 GPa more"
	case "LossFactor":
		return "loss factor 0.01 more"
	case "Size[0]":
		return "front 1 mm wider"
	case "Size[1]":
		return "front 1 mm higher"
	case "Hole":
		return "holes 0.1 mm wider"
	case "Slot":
		return "gaps 0.1 mm wider"
	case "Slat":
		return "slats 1 mm wider"
	}
	step := "1 mm"
	if s.Step == tenthMM {
		step = "0.1 mm"
	}
	switch s.Dimension {
	case "Cavity":
		return "cavity " + step + " deeper"
	case "Pitch":
		return "holes " + step + " further apart"
	case "Sheet":
		return "sheet " + step + " thicker"
	}
	return s.Dimension
}
