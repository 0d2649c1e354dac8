"""The bench calculator: the notation's expressions by themselves, without a procedure.

    names       what a catalogue is asked here: keys with hyphens for blanks, bare formulas
    reading     text to syntax: the notation's own reader, with materials written out in parentheses
    typing      dimensions and functions; what needs a procedure is told apart
    evaluating  figures, and what they rest on
    of_solution a solution as a whole: density, mass, volume, strength
    equations   `balance(…)`
    diluting    `dilution(…)`
    answers     one expression to one answer

What is read, typed and worked out is what marks use; only the names differ, since there is no front
matter that could declare any. Nothing here touches a file.
"""
