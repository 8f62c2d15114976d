package exact
