// Package page is the vocabulary of HTML: ladders, tables, notes and figures as
// fragments that every page and every report is made of, and the stylesheet they
// share.
//
// All text is escaped by html/template and cleaned by [Text] first. The fragments
// hold no script, no style attribute and no address of another host, so they
// stand under a strict Content-Security-Policy. What they say is never said by
// colour alone.
package page
