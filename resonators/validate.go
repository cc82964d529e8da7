package resonators

func (n Neck) Validate() error            { return nil }
func (p Panel) Validate() error           { return nil }
func (p Perforated) Validate() error      { return nil }
func (s Slotted) Validate() error         { return nil }
func (m Microperforated) Validate() error { return nil }
func (p Porous) Validate() error          { return nil }
