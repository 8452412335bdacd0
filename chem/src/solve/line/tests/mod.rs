mod tables;
