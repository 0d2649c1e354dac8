# Watchglass: `make demo` builds the demo handbook, `make test` runs the tests.
# Both set up .venv by themselves; PYTHON chooses the interpreter (3.11 or newer).

PYTHON ?= python3
VENV   ?= .venv
BIN    := $(VENV)/bin

.PHONY: demo test lint check units catalogue bench clean help

help:
	@echo "make demo       set up and build the demo handbook"
	@echo "make test       set up and run the tests"
	@echo "make lint       style, types, layers, registry"
	@echo "make check      judge the demo set"
	@echo "make units      make the unit table anew from its definitions"
	@echo "make catalogue  make the index of the catalogue's names anew"
	@echo "make bench      time whole commands and print ratios"
	@echo "make clean      take away what was built"

$(VENV)/.ready: pyproject.toml
	@$(PYTHON) -c 'import sys; sys.exit(sys.version_info < (3, 11))' || \
		{ echo "Watchglass needs Python 3.11 or newer; say which with: make demo PYTHON=python3.12"; exit 1; }
	$(PYTHON) -m venv $(VENV)
	$(BIN)/python -m pip install --quiet --disable-pip-version-check --editable .
	@touch $@

$(VENV)/.ready-dev: $(VENV)/.ready
	$(BIN)/python -m pip install --quiet --disable-pip-version-check --editable '.[dev]'
	@touch $@

demo: $(VENV)/.ready
	$(BIN)/watchglass build site_demo

check: $(VENV)/.ready
	$(BIN)/watchglass check procedures_src

test: $(VENV)/.ready-dev
	$(BIN)/python -m pytest

lint: $(VENV)/.ready-dev
	$(BIN)/ruff check .
	$(BIN)/ruff format --check .
	$(BIN)/mypy
	$(BIN)/lint-imports

units: $(VENV)/.ready-dev
	$(BIN)/python tests/tools/unit_table.py

catalogue: $(VENV)/.ready-dev
	$(BIN)/python tests/tools/name_index.py
	$(BIN)/python tests/tools/component_index.py

bench: $(VENV)/.ready-dev
	$(BIN)/python tests/bench/whole_commands.py

clean:
	rm -rf site_demo/public build dist .mypy_cache .ruff_cache .pytest_cache .import_linter_cache
