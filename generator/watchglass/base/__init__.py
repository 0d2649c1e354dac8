"""What every stage stands on: places in text, findings, typed quantities, YAML with positions."""
