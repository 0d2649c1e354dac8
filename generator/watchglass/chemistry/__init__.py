"""Chemistry: numbers in, numbers out.

Formulas, equations, amounts, strengths, structures counted for their atoms, gases. Nothing here
knows of procedures, files or findings, and nothing is imported but the standard library: what is
computed can be checked against a book with a pencil beside it.

Units are those of the SI everywhere (kg, m3, mol, mol/m3, kg/m3, K, Pa), with one exception that
follows the custom of the field: `Formula.molar_mass` is in g/mol. `Formula.molar_mass_si` is the
same in kg/mol, and that is what every function here takes.

What an author wrote may be wrong, so the functions that read text give a fault with its place in
that text and never raise. The functions that compute raise `ValueError` for arguments that no
caller should pass, such as a negative mass.
"""
