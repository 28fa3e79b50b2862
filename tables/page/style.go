package page

import _ "embed"

// Style is the stylesheet of all fragments of this package and of what stands
// around them: colours in light and dark as custom properties of :root, type,
// ladder, table, notes, figure, and how they print. It names no font or file that
// would have to be fetched.
//
//go:embed style.css
var Style string
