package resonators

import "fmt"

// Quantity says in which units people measure a dimension.
type Quantity int

// The quantities of dimensions.
const (
	AsIs     Quantity = iota // in units that are the same everywhere
	Length                   // Step in m
	Volume                   // Step in m³
	AreaMass                 // Step in kg/m²
)

// Quantity returns the quantity that the dimension is.
func (s Sensitivity) Quantity() Quantity {
	switch s.Dimension {
	case "Volume":
		return Volume
	case "Mass":
		return AreaMass
	case "Gauze", "FillShare", "FillFlow", "Fill.FlowResistivity", "Edge", "Youngs", "LossFactor":
		return AsIs
	}
	return Length
}

// Words says what one step of the dimension is, as "cavity 1 mm deeper"; step is
// the step as written, not wanted where the quantity is AsIs.
func (s Sensitivity) Words(step string) string {
	switch s.Dimension {
	case "Gauze":
		return "gauze 10 Pa·s/m more"
	case "FillShare":
		return "1 % more of the box filled"
	case "FillFlow", "Fill.FlowResistivity":
		return "flow resistivity 1000 Pa·s/m² more"
	case "Edge":
		return "edge loss 10 Pa·s/m more"
	case "Youngs":
		return "Young's modulus 0.1 GPa more"
	case "LossFactor":
		return "loss factor 0.01 more"
	}
	format, known := map[string]string{
		"Volume": "%s more air in the box", "MouthRadius": "mouth %s more in radius", "Length": "neck %s longer",
		"Fill.Thickness": "fill %s thicker", "Mass": "sheet %s heavier", "Thickness": "sheet %s thicker, at the same mass",
		"Size[0]": "front %s wider", "Size[1]": "front %s higher", "Hole": "holes %s wider", "Slot": "gaps %s wider",
		"Slat": "slats %s wider", "Cavity": "cavity %s deeper", "Pitch": "holes %s further apart", "Sheet": "sheet %s thicker",
	}[s.Dimension]
	if !known {
		return s.Dimension + " " + step + " more"
	}
	return fmt.Sprintf(format, step)
}
