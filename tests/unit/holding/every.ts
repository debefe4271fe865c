/** What mutants of the engine are tried against, as one file, so that the engine is loaded once a mutant: quick tests first, random logs last. */
import './check-cases.test'
import './judging.test'
import './units.test'
import './parse.test'
import './words.test'
import './oracle.test'
