"""The bench: every event of a procedure applied to its vessels, and the ledger of what became of them.

`state` holds what a vessel is and holds; `knowledge` what is known of each component; `bringing`
turns portions of materials into components; `liquids` sorts liquids into layers; `mixing` brings
them to equilibrium; `runner` is what acts are made of, `acts` has one function a verb, `said` what
stands beside it. `bench.run_bench` goes through a procedure's events and gives the `ledger`.

The model and its limits: layers are in equilibrium after mixing, at 25 °C, ideal, with additive
volumes; only neutral forms partition, by a measured ratio or by octanol–water's; a liquid that makes
up less than a fifth of a layer is dissolved in it and partitions too, any other keeps to its layer;
a salt dissolves up to its solubility; carbon dioxide leaves above its own. Transfers leave nothing
behind. A still parts liquids by their boiling points, without overlap and without azeotropes. What
an author states to be solid stays so until it is heated or meets more liquid. Where a constant is
missing the figure is unknown, with its reason, and offends nobody further on.
"""
