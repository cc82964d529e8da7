package study

// stages holds what later runs may take over.
type stages struct{}
