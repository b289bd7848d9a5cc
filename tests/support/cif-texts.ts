/** Texts of our own (invented values) that use all the syntax, to be cut, mutated and shuffled. */
export const plainCif = `#\\#CIF_1.1
# invented values
data_Ruby.1
_chemical_name 'ruby, a "red" corundum's name'
_chemical_formula_sum 'Al1.99 Cr0.01 O3'
_cell_length_a 4.76(1) _cell_length_c 12.99(2)
_note
;\\
A long line that is \\
folded once.
;
loop_
_symop_id _symop_xyz
1 'x, y, z'
2 '-y, x-y, z'
3 "-x+y, -x, z"
loop_
_site_label
_site_x
_site_y
_site_flag
Al1 0.0 0.3520(3) d
O1' ? . 'not found'
H2
;
two lines
of text
;
1/3 .
_end "" # last
data_second
_a ;b
save_frame
_dictionary.name '_x'
save_
`;

export const richCif = `#\\#CIF_2.0
data_rich
_list [1 2.5(1) [ 'a b' "c" ] ? . {} ]
_table {'one':1 "two":[2 2] '''three
lines''':"""3 "x" 3"""
'text':
;>\\
>;prefixed
;
}
_triple '''it's
a "string"
over lines'''
loop_ _m _n
[[1 0] [0 1]] {'k':'v'}
[] é
save_Frame _inner [a [b [c]]] save_
data_Ω _last 1
`;

export const brokenCif = `Text before all
data_
_a 'open
_b
_c P 21/c
loop_ _d _e 1 2 3
_f
;no end
_g 1
data_x data_X loop_ 1 2
stop_ global_ _h [1 2
loop_ _i
save_ stray 'words' here
_j $frame _j 2
_k 'x'y
;`;
