// Package engines holds the tests of the page in Chromium, Firefox and WebKit: one list of what a person does, driven over
// the open protocols WebDriver and WebDriver BiDi. It has no code of its own.
package engines
