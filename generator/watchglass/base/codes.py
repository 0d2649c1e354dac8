"""The one registry of findings.

A number is a letter for the subject and three digits; it is never given to another fault. A name
states the fault and reads well after "accept". Each code has an explanation page in
`explanations/` beside this module, whose wrong and mended examples run as tests.

Letters: N notation, Q quantities, K catalogue, S stoichiometry, B bench and vessels, X acid–base
and partition, H hazards, W waste, E editions, P prep and print.
"""

from __future__ import annotations

from watchglass.base.findings import Code, Severity

_ERROR, _WARNING, _NOTE = Severity.ERROR, Severity.WARNING, Severity.NOTE

# -- N: notation -------------------------------------------------------------------------------
TEXT_NOT_UTF8 = Code("N101", "text-not-utf8", _ERROR, "the file is not UTF-8 text")
SOURCE_TOO_LARGE = Code("N102", "source-too-large", _ERROR, "the file is beyond the size read")
NESTED_TOO_DEEPLY = Code("N103", "nested-too-deeply", _ERROR, "blocks or brackets nest too deeply")
TOO_MANY_MARKS = Code("N104", "too-many-marks", _ERROR, "the file holds more marks than are read")
TOO_MANY_PASSES = Code("N105", "too-many-passes", _ERROR, "steps are repeated beyond what is run")
MARK_NOT_CLOSED = Code("N110", "mark-not-closed", _ERROR, "a brace opens and never closes")
MARK_NOT_READ = Code("N111", "mark-not-read", _ERROR, "a mark cannot be read")
MARK_EMPTY = Code("N112", "mark-empty", _ERROR, "a mark has nothing in it")
MARK_LOST = Code("N113", "mark-lost", _ERROR, "a brace stands where no mark can be")
BRACE_ALONE = Code("N114", "brace-alone", _ERROR, "a brace closes what was not opened")
ACT_UNKNOWN = Code("N115", "act-unknown", _ERROR, "a word is no act of the bench")
CLAUSE_UNFIT = Code("N116", "clause-unfit", _ERROR, "a clause does not belong to its act")
CLAUSE_TWICE = Code("N117", "clause-twice", _ERROR, "a clause stands twice in one act")
CLAUSE_MISSING = Code("N118", "clause-missing", _ERROR, "an act lacks a clause it needs")
EXPRESSION_NOT_READ = Code("N119", "expression-not-read", _ERROR, "an expression cannot be read")
BLOCK_UNKNOWN = Code("N120", "block-unknown", _ERROR, "a `:::` block is of no known kind")
BLOCK_NOT_CLOSED = Code("N121", "block-not-closed", _ERROR, "a `:::` block is never closed")
BLOCK_END_ALONE = Code("N122", "block-end-alone", _ERROR, "a `:::` closes nothing")
BLOCK_ARGUMENT = Code("N123", "block-argument", _ERROR, "a `:::` line says what is not understood")
ANSWER_ALONE = Code("N124", "answer-alone", _ERROR, "an answer stands outside a question")
HTML_NOT_READ = Code(
    "N125", "html-not-read", _ERROR, "a tag or a comment of HTML stands in the text"
)
FRONT_MATTER_MISSING = Code("N130", "front-matter-missing", _ERROR, "there is no front matter")
FRONT_MATTER_OPEN = Code("N131", "front-matter-open", _ERROR, "the front matter is not closed")
YAML_NOT_READ = Code("N140", "yaml-not-read", _ERROR, "the YAML cannot be read")
KEY_TWICE = Code("N141", "key-twice", _ERROR, "a key stands twice")
YAML_REFUSED = Code("N142", "yaml-refused", _ERROR, "an anchor, alias, tag or merge is used")
FIELD_UNKNOWN = Code("N143", "field-unknown", _ERROR, "a field is not known here")
FIELD_MISSING = Code("N144", "field-missing", _ERROR, "a field that is needed is missing")
FIELD_UNFIT = Code("N145", "field-unfit", _ERROR, "a field holds another kind of value")
MARK_IN_YAML = Code("N146", "mark-in-yaml", _ERROR, "a mark stands in YAML without quotes")
STEP_NUMBER_DIFFERS = Code(
    "N150", "step-number-differs", _WARNING, "a typed step number differs from the counted one"
)
NAME_UNFIT = Code("N160", "name-unfit", _ERROR, "a name cannot be told from a number or unit")
NAME_RESERVED = Code("N161", "name-reserved", _ERROR, "a name is an act, a clause word or a unit")
NAME_TWICE = Code("N162", "name-twice", _ERROR, "a name is declared twice")
NAME_UNKNOWN = Code("N163", "name-unknown", _ERROR, "a name is declared nowhere")
NAME_OF_OTHER_KIND = Code("N164", "name-of-other-kind", _ERROR, "a name is of another kind")
STEP_UNKNOWN = Code("N165", "step-unknown", _ERROR, "a step is named that does not exist yet")
FUNCTION_UNKNOWN = Code("N166", "function-unknown", _ERROR, "an expression calls no known function")
FUNCTION_UNFIT = Code("N167", "function-unfit", _ERROR, "a function is given what it cannot take")
PLACES_DIFFER = Code("N168", "places-differ", _ERROR, "a sentence names two places for one charge")
MATERIAL_UNUSED = Code("N180", "material-unused", _WARNING, "a material is declared and never used")
VESSEL_UNUSED = Code("N181", "vessel-unused", _WARNING, "a vessel is declared and never used")
NOT_YET_RUN = Code("N190", "not-yet-run", _NOTE, "acts are read and checked, not run")
PRODUCT_VESSEL_UNKNOWN = Code(
    "N200", "product-vessel-unknown", _ERROR, "another procedure has no such vessel"
)
CODE_TWICE = Code("N191", "code-twice", _ERROR, "two procedures have one code")
ACCEPT_WITHOUT_REASON = Code(
    "N192", "accept-without-reason", _ERROR, "a finding is accepted without a reason"
)
ACCEPT_WITHOUT_EFFECT = Code(
    "N193", "accept-without-effect", _WARNING, "what is accepted is not found"
)
ACCEPT_UNKNOWN = Code("N194", "accept-unknown", _ERROR, "what is accepted is no finding's name")
TIME_OVER_PERIOD = Code("N195", "time-over-period", _WARNING, "the steps take more than the period")
LINK_BROKEN = Code("N196", "link-broken", _ERROR, "a link leads nowhere")
PROCEDURE_UNKNOWN = Code(
    "N197", "procedure-unknown", _ERROR, "a procedure is named that is not there"
)
ACT_WITHOUT_PLACE = Code(
    "N198", "act-out-of-place", _ERROR, "an act stands where nothing happens at the bench"
)
ADDRESS_UNFIT = Code("N199", "address-unfit", _ERROR, "a code cannot serve as an address")

# -- Q: quantities -----------------------------------------------------------------------------
NUMBER_NOT_READ = Code("Q101", "number-not-read", _ERROR, "a number cannot be read")
DECIMAL_COMMA = Code("Q102", "decimal-comma", _ERROR, "a number is written with a comma")
DIGITS_APART = Code("Q103", "digits-apart", _ERROR, "a number is written in groups")
UNIT_MISSING = Code("Q104", "unit-missing", _ERROR, "a number has no unit")
UNIT_UNKNOWN = Code("Q105", "unit-unknown", _ERROR, "a unit is not in the list")
NORMALITY = Code("Q106", "normality", _ERROR, "a strength is given as normality")
PERCENT_WITHOUT_BASIS = Code(
    "Q107", "percent-without-basis", _ERROR, "a percentage does not say of what"
)
UNIT_AMBIGUOUS = Code("Q108", "unit-ambiguous", _ERROR, "a unit can be read in two ways")
DIMENSION_WRONG = Code("Q109", "dimension-wrong", _ERROR, "a quantity has another dimension")
QUANTITY_NEGATIVE = Code("Q110", "quantity-negative", _ERROR, "a quantity cannot be negative")
BELOW_ABSOLUTE_ZERO = Code("Q111", "below-absolute-zero", _ERROR, "nothing is that cold")
DIMENSIONS_CLASH = Code("Q112", "dimensions-clash", _ERROR, "two dimensions do not go together")
SIZE_IMPLAUSIBLE = Code(
    "Q113", "size-implausible", _WARNING, "a quantity is beyond a teaching laboratory"
)
QUANTITY_UNTYPED = Code("Q114", "quantity-untyped", _WARNING, "a quantity stands outside a mark")
WORDS_DISAGREE = Code("Q115", "words-disagree", _ERROR, "words and their mark say different things")
RANGE_REVERSED = Code("Q116", "range-reversed", _ERROR, "a range ends below its start")
PH_BEYOND_SCALE = Code("Q118", "ph-beyond-scale", _ERROR, "no solution has that pH")
QUANTITY_NOUGHT = Code("Q119", "quantity-nought", _ERROR, "nothing of a material is taken")
SHARE_ABOVE_ONE = Code("Q117", "share-above-one", _ERROR, "a share is more than the whole")

# -- K: catalogue ------------------------------------------------------------------------------
SUBSTANCE_UNKNOWN = Code("K101", "substance-unknown", _ERROR, "a substance is not in the catalogue")
CAS_WRONG = Code("K102", "cas-wrong", _ERROR, "a CAS number has a wrong check digit")
FORMULA_NOT_READ = Code("K103", "formula-not-read", _ERROR, "a formula cannot be read")
FORMULA_AND_SMILES_DIFFER = Code(
    "K104", "formula-and-smiles-differ", _ERROR, "formula and SMILES have other atoms"
)
SUBSTANCE_NAME_TWICE = Code("K105", "substance-name-twice", _ERROR, "two substances share a name")
GLASSWARE_UNKNOWN = Code("K106", "glassware-unknown", _ERROR, "a vessel is of no known type")
SIZE_UNUSUAL = Code("K107", "size-unusual", _WARNING, "a vessel is of a size not made")
SOURCE_MISSING = Code("K108", "source-missing", _WARNING, "a value does not say where it is from")
VALUE_IMPLAUSIBLE = Code("K109", "value-implausible", _WARNING, "a value cannot well be true")
SMILES_NOT_READ = Code("K110", "smiles-not-read", _ERROR, "a SMILES cannot be read")
MATERIAL_NOT_READ = Code("K111", "material-not-read", _ERROR, "a material cannot be read")
DIFFERS_FROM_SHIPPED = Code(
    "K130", "differs-from-shipped", _WARNING, "a set's figure is far from that of the catalogue"
)
HYDRATE_UNFIT = Code(
    "K131", "hydrate-unfit", _WARNING, "a name and a formula hold different amounts of water"
)
SOLUTION_DENSITY_DIFFERS = Code(
    "K120", "solution-density-differs", _WARNING, "a solution of this strength has another density"
)

# -- S: stoichiometry --------------------------------------------------------------------------
EQUATION_NOT_READ = Code("S101", "equation-not-read", _ERROR, "an equation cannot be read")
EQUATION_UNBALANCED = Code("S102", "equation-unbalanced", _ERROR, "an equation does not balance")
SPECIES_UNKNOWN = Code("S103", "species-unknown", _ERROR, "an equation names no known substance")
SPECIES_AMBIGUOUS = Code("S104", "species-ambiguous", _ERROR, "a formula fits two materials")
DENSITY_UNKNOWN = Code("S110", "density-unknown", _ERROR, "a density is needed and not known")
PROVIDED_EXCEEDED = Code("S111", "provided-exceeded", _ERROR, "the steps use more than is provided")
ALL_OF_NOTHING = Code(
    "S112", "all-of-nothing", _ERROR, "all of a material is used, none is provided"
)
NOT_LIMITING = Code(
    "S130", "other-reactant-limits", _WARNING, "another reactant than the declared one limits"
)
STATED_AMOUNT_DISAGREES = Code(
    "S131", "stated-amount-disagrees", _WARNING, "words state another amount than the mark brings"
)
REACTANT_NOT_AT_HAND = Code(
    "S132", "reactant-not-at-hand", _WARNING, "a reaction needs what no material brings"
)
REACTANT_NOT_IN_VESSEL = Code(
    "S133", "reactant-not-in-vessel", _ERROR, "a reaction runs where a reactant never comes"
)
STRENGTH_IMPOSSIBLE = Code(
    "S134", "strength-impossible", _WARNING, "a solution is stronger than its solute can make it"
)
MORE_THAN_FORMS = Code(
    "S135", "more-than-can-form", _WARNING, "more of a product is stated than can form"
)
LABEL_DISAGREES = Code(
    "S120", "label-disagrees", _WARNING, "a label says two strengths that are not the same"
)
LIMITING_UNFIT = Code("S113", "limiting-unfit", _ERROR, "the limiting reactant does not react")

# -- B: bench and vessels -----------------------------------------------------------------------
MORE_FIGURES_THAN_WARE = Code(
    "B100", "more-figures-than-ware", _WARNING, "a figure is finer than the ware that measures it"
)
WARE_TOO_SMALL = Code(
    "B101", "ware-too-small", _WARNING, "more is measured than the ware takes in one filling"
)
WARE_TOO_LARGE = Code(
    "B102", "ware-too-large", _WARNING, "a volume is too small for the ware that measures it"
)
ONE_MARK_OTHER_VOLUME = Code(
    "B103", "one-mark-other-volume", _WARNING, "ware with one mark is to give another volume"
)
SIZE_NOT_OWNED = Code(
    "B110", "size-not-owned", _WARNING, "scaled measuring ware is owned in no such size"
)
SCALED_BEYOND_MEASURE = Code(
    "B111", "scaled-beyond-measure", _WARNING, "a scaled amount is too small to be measured"
)
VESSEL_OVERFILLED = Code("B120", "vessel-overfilled", _ERROR, "a vessel holds more than its size")
VESSEL_TOO_FULL = Code(
    "B121", "vessel-too-full", _WARNING, "a vessel is too full for what is done in it"
)
GAS_IN_CLOSED_VESSEL = Code(
    "B122", "gas-in-closed-vessel", _ERROR, "gas comes off in a vessel that is closed"
)
VESSEL_EMPTY = Code("B123", "vessel-empty", _ERROR, "something is done with a vessel that is empty")
MORE_THAN_THERE = Code("B124", "more-than-there", _ERROR, "more is taken than a vessel holds")
LAYER_ABSENT = Code("B125", "layer-absent", _ERROR, "a layer is named where there is one liquid")
LAYERS_TOO_CLOSE = Code("B126", "layers-too-close", _ERROR, "which layer lies below cannot be told")
LAYER_OTHER = Code("B127", "other-layer-drawn", _ERROR, "what is wanted is in the other layer")
HEATED_CLOSED = Code("B128", "heated-while-closed", _ERROR, "a closed vessel is heated")
HOTTER_THAN_IT_BOILS = Code(
    "B129", "hotter-than-it-boils", _WARNING, "a liquid is heated above its boiling point"
)
HEAT_WITHOUT_COOLING = Code(
    "B130", "heat-without-cooling", _ERROR, "an act gives out heat that nothing takes up"
)
WATER_INTO_ACID = Code(
    "B131", "water-into-acid", _ERROR, "water is poured into a concentrated acid or base"
)
VESSEL_NEVER_EMPTIED = Code(
    "B132", "vessel-never-emptied", _WARNING, "what a vessel holds at the end goes nowhere"
)
TITRE_OUT_OF_RANGE = Code(
    "B133", "titre-out-of-range", _WARNING, "a titre does not suit its burette"
)
OPPOSITES_POURED = Code(
    "B134", "opposites-poured-together", _ERROR, "a basic layer goes into an acid one"
)
PEROXIDE_FORMER_UNTESTED = Code(
    "B135", "peroxide-former-untested", _ERROR, "a peroxide former is concentrated without a test"
)
SOLID_IN_FUNNEL = Code(
    "B136", "solid-in-funnel", _WARNING, "a solid stands in a funnel whose layers are drawn"
)
EMULSION_TO_EXPECT = Code(
    "B137", "emulsion-to-expect", _WARNING, "layers are shaken with a soap between them"
)
VESSEL_NOT_CLEAN = Code(
    "B138", "vessel-not-clean", _WARNING, "a vessel is used again unrinsed where it matters"
)
PRODUCT_NOT_COLLECTED = Code(
    "B139", "product-not-collected", _WARNING, "a product is thrown away or never taken up"
)

# -- X: acid–base and partition ------------------------------------------------------------------
EXPECTATION_MISSED = Code(
    "X101", "expectation-missed", _ERROR, "the bench gives another figure than is expected"
)
REAGENT_TOO_WEAK = Code(
    "X102", "reagent-too-weak", _ERROR, "an acid or base does not move what it is to move"
)
REAGENT_WRONG_WAY = Code(
    "X103", "reagent-wrong-way", _ERROR, "no amount of a reagent brings the pH that is asked for"
)
GOES_ALONG = Code("X104", "second-goes-along", _WARNING, "a reagent takes a second substance along")
WANTED_DISCARDED = Code(
    "X105", "wanted-discarded", _ERROR, "a layer is thrown away with what is wanted later"
)
INDICATOR_ELSEWHERE = Code(
    "X107", "indicator-elsewhere", _WARNING, "an indicator changes away from the equivalence point"
)
NO_PH_TEST = Code("X106", "ph-not-tested", _WARNING, "a pH is adjusted and never tested")

# -- E: editions -------------------------------------------------------------------------------
ACT_IN_HIDDEN_BLOCK = Code(
    "E110", "act-in-hidden-block", _ERROR, "an act stands where students do not see it"
)

# -- P: prep and print ---------------------------------------------------------------------------
STOCK_SOURCE_UNKNOWN = Code(
    "P101", "stock-source-unknown", _ERROR, "a stock is made from no stock, or from itself"
)
STOCK_NOT_FROM_SOURCE = Code(
    "P102", "stock-not-from-source", _ERROR, "a stock cannot be diluted from the one named"
)
STOCK_OFF_STRENGTH = Code(
    "P103", "stock-off-strength", _WARNING, "what can be weighed misses the strength of a stock"
)
STOCK_STRONGER_THAN_REAGENT = Code(
    "P104", "stock-stronger-than-reagent", _WARNING, "a stock is stronger than what it is made from"
)


def _collect() -> tuple[Code, ...]:
    return tuple(
        sorted((value for value in globals().values() if isinstance(value, Code)), key=_number)
    )


def _number(code: Code) -> str:
    return code.number


ALL: tuple[Code, ...] = _collect()
_BY_WORD = {word: code for code in ALL for word in (code.number, code.name)}


def find(word: str) -> Code | None:
    """Find a code by number (in either case) or name; None where there is none."""
    return _BY_WORD.get(word) or _BY_WORD.get(word.upper())


def words() -> tuple[str, ...]:
    """Give every number and name, for near misses."""
    return tuple(_BY_WORD)
