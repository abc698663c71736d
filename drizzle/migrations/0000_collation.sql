-- Names compare exactly, trailing spaces and letter case included; every table made later inherits this.
ALTER DATABASE CHARACTER SET utf8mb4 COLLATE utf8mb4_nopad_bin;
