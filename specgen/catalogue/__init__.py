"""Tables as data: device classes, sensor classes, figures of the trade, each row with its source and standing."""
