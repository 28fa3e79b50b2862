// Package web is the page at the tank: a server whose pages a telephone, a tablet
// or a shared laptop in the cellar shows. It knows no gravity and no journal.
// Everything it shows comes from a [Desk], which answers with the logic of the
// commands, so that a page and a command cannot say different things.
//
// Pages are written on the server and work without script; the one script shows
// the read-back while one types. Nothing is fetched from elsewhere.
//
// Every request is checked before a Desk sees it: the name it was sent to, the
// site it came from, the session, the token of its form. What stores or voids has
// a token that works once: sent again, it shows what the first did. Every answer,
// errors included, carries the same strict headers. Without a passphrase and TLS
// [CheckListen] allows the machine itself alone.
package web
