# What Doxygen is given instead of a header: awk -f reference_filter.awk FILE
#
# Lines keep their numbers, and code stays as it is, but for these:
#   - the // block that opens a file becomes the file's documentation; paragraphs with indented lines
#     (code, tables) are shown as they stand; a file without such a block gets a command that does
#     not exist, so that Doxygen complains;
#   - namespace detail is hidden, but for the bases of public classes that are listed below: users
#     see their members;
#   - members that mean the same in every class are documented here once, where a class says no more;
#   - in these bases `protected:` reads `private:`.

BEGIN {
    shown = "axial_solid direction_law elliptic_region law location_scale region_base " \
            "rejecting_region spherical_shell"
    split(shown, names, " ")
    for (i in names) {
        is_shown[names[i]] = 1
    }

    # The first that fits a declaration is taken.
    same("using result_type =", "The type of a draw.")
    same("using state_type =", "The full state: the words that the constructor takes.")
    same("using param_type =", "The parameters, as ISO C++ [rand.req.dist] names their type.")
    same("using distribution_type =", "The law that these are the parameters of.")
    same("using real_type =", "The type of a coordinate.")
    same("using point_type =", "The type of a point.")
    same("using bounds_type =", "The type of the box around the region.")
    same("static constexpr std::size_t dimension =", "The number of coordinates of a point.")
    same("static constexpr const char[*] law_name =", "The law's name, as messages print it.")
    same("static constexpr .*default_seed =", "The seed of a default-constructed engine.")
    same("static constexpr int state_bits =", "The bits of state that seeding can reach.")
    same("(static )?constexpr .* min[(][)]", "The least value that a draw can have.")
    same("(static )?constexpr .* max[(][)]", "The greatest value that a draw can have.")
    same("static constexpr void each[(]", "Calls visit(field) for each parameter, in order.")
    same("static constexpr wide_integer period[(][)]",
         "How many draws there are before they repeat.")
    same("using error::error;", "With this text.")
    same("constexpr void seed[(][)]", "Back to the default seed.")
    same("constexpr void seed[(].*uint64_t", "As constructed from this number.")
    same("constexpr void seed[(]", "As constructed from this seed sequence.")
    same("constexpr void discard[(]", "Skips n draws.")
    same("constexpr void reset[(][)]", "Does nothing: no draw depends on earlier ones.")
    same("constexpr void advance[(]", "Skips any number of draws, exactly.")
    same("constexpr state_type state[(][)]", "The full state, for the constructor.")
    same("constexpr result_type operator[(][)][(][)]", "The next draw.")
    same("constexpr explicit [a-z_0-9]+[(]Sequence& [a-z]+[)]",
         "From a seed sequence, which is never refused.")
    same("constexpr explicit [a-z_0-9]+[(]const (param_type|[a-z_]+_parameters<.*>)& p[)]",
         "From parameters; what they must not be is refused.")
    same("constexpr (explicit )?[a-z_0-9]+[(]detail::number",
         "From the arguments in this order, numbers of any type; what they must not be is refused.")
    same("constexpr (explicit )?[a-z_0-9]+[(]std::vector<",
         "From the arguments in this order; what they must not be is refused.")
    same("constexpr .* param[(][)] const", "The parameters.")
    same("constexpr .* mean[(][)] const", "The mean.")
    same("constexpr .* variance[(][)] const", "The variance.")
    same("constexpr .* measure[(][)] const", "The length, area or volume.")
    same("constexpr .* bounds[(][)] const", "The box around the region.")
    same("constexpr .* limit[(][)] const", "The position up to which words may be drawn.")
    same("constexpr .* position[(][)] const", "How many words have been drawn.")
    same("[a-z_]+[(].*[)] ?-> ?[a-z_]+<", "How the template's arguments are deduced.")
    same("static constexpr .* standard_density[(]", "The density at location 0 and scale 1.")
    same("static constexpr double standard_cumulative[(]",
         "The chance of a draw of at most z, at location 0 and scale 1.")
    same("static constexpr double standard_quantile[(]",
         "The value that a draw is at most with chance p, at location 0 and scale 1.")
    same("friend .*bool operator==[(]", "Whether the two have equal state or parameters.")
    same("friend std::basic_ostream.*operator<<[(]", "Writes the text form: words separated by one space.")
    same("friend std::basic_istream.*operator>>[(]",
         "Reads the text form; anything else sets failbit and leaves the object as it was.")
}

function same(declaration, meaning) {
    declarations[++same_count] = "^(\\[\\[nodiscard\\]\\] )?" declaration
    meanings[same_count] = meaning
}

{ line[NR] = $0 }

END {
    head_end = 0
    while (head_end < NR && line[head_end + 1] ~ /^\/\//) {
        ++head_end
    }
    if (head_end == 0) {
        line[1] = "/** @this_header_opens_with_no_comment */ " line[1]
    } else {
        file_documentation()
    }
    for (i = head_end + 1; i <= NR; ++i) {
        common_member(i)
        same_as_file(i)
    }
    for (i = head_end + 1; i <= NR; ++i) {
        namespace_detail(i)
        concept_or_empty(i)
    }
    for (i = 1; i <= NR; ++i) {
        print line[i]
    }
}

# ---- The opening block ----

function file_documentation(    i, j, k, literal, was_literal) {
    for (i = 1; i <= head_end; ++i) {
        line[i] = substr(line[i], 3)
        gsub(/[*]\//, "* /", line[i])
    }
    in_code = 0
    was_literal = 0
    for (i = 1; i <= head_end; i = j + 1) { # a paragraph: lines i to j - 1, a blank line j
        literal = 0
        for (j = i; j <= head_end && line[j] !~ /^ *$/; ++j) {
            if (i > 1 && line[j] ~ /^( *- |  )/) {
                literal = 1
            }
        }
        if (literal != was_literal) {
            line[i - 1] = literal ? "@verbatim" : "@endverbatim"
        }
        for (k = i; k < j && !literal; ++k) {
            line[k] = as_prose(line[k])
        }
        was_literal = literal
    }
    if (literal) {
        line[head_end] = line[head_end] " @endverbatim"
    }
    line[1] = "/** @file " file_name() " @brief" line[1]
    line[head_end] = line[head_end] " */"
}

# Text that Doxygen shows as it stands, but for what is in backticks.
function as_prose(text,    i, c, out) {
    out = ""
    if (!in_code && match(text, /^ *[0-9]+[.]/)) { # not an item of a list
        out = substr(text, 1, RLENGTH - 1) "\\."
        text = substr(text, RLENGTH + 1)
    }
    for (i = 1; i <= length(text); ++i) {
        c = substr(text, i, 1)
        if (c == "`") {
            in_code = !in_code
        } else if (!in_code && index("\\@&<>#%", c) > 0) {
            c = "\\" c
        }
        out = out c
    }
    return out
}

# A class with its header's name has the header's documentation on its own page too.
function same_as_file(i,    stem, k) {
    stem = FILENAME
    sub(/^.*\//, "", stem)
    sub(/[.]hpp$/, "", stem)
    if (line[i] ~ "^class " stem "( |$)" && line[i] !~ /;$/) {
        for (k = i - 1; line[k] ~ /^(template|requires| )/; --k) {
        }
        if (line[k] ~ /^\/\/\//) {
            line[k] = line[k] " @details @copybrief " file_name() " @copydetails " file_name()
        }
    }
}

function file_name(    name) {
    name = FILENAME
    sub(/^.*\/include\//, "", name)
    return name
}

# Doxygen says nothing of concepts and of empty classes without a docstring.
function concept_or_empty(i,    k) {
    if (line[i] ~ /^concept / || line[i] ~ /^(class|struct) .*[{]};$/) {
        for (k = i - 1; line[k] ~ /^(template|requires| )/; --k) {
        }
        if (line[k] !~ /^\/\/\// && line[i - 1] !~ /^template <>/) {
            line[i] = "/** @this_has_no_docstring */ " line[i]
        }
    }
}

# ---- Members that are the same everywhere ----

function common_member(i,    declaration, k) {
    declaration = line[i]
    sub(/^ +/, "", declaration)
    sub(/LEAT_VECTOR_CONSTEXPR/, "constexpr", declaration)
    for (k = 1; k <= same_count; ++k) {
        if (declaration ~ declarations[k]) {
            document(i, meanings[k])
            return
        }
    }
    if (declaration ~ /^(\[\[nodiscard\]\] )?constexpr [^(]*[ &][a-z_0-9]+\(\) const noexcept [{]/) {
        getter(i, declaration)
    }
}

# A function that returns what its name says: `radius() ... { return radius_; }` and the like.
function getter(i, declaration,    name, returned) {
    name = declaration
    sub(/\(.*$/, "", name)
    sub(/^.*[ &]/, "", name)
    returned = declaration ~ /return/ ? declaration : line[i + 1]
    if (returned ~ "return (.*[.])?" name "(_|[(][)])?;") {
        gsub(/_/, " ", name)
        document(i, "The " name " that it was made with.")
    }
}

# Puts a docstring before the declaration in line i, unless there is one.
function document(i, text,    first, indent) {
    first = i
    if (line[i - 1] ~ /^ *template </) {
        first = i - 1
    }
    if (line[first - 1] !~ /^ *\/\/\//) {
        match(line[first], /^ */)
        indent = RLENGTH
        line[first] = substr(line[first], 1, indent) "/** " text " */ " \
                      substr(line[first], indent + 1)
    }
}

# ---- Hidden namespaces ----

function namespace_detail(i,    k, name) {
    if (line[i] ~ /^[a-z].* detail::[a-z_]+[(]/) { # the definition of what was declared there
        line[i] = "/** @cond */ " line[i]
        for (k = i; k < NR && line[k] !~ /^}|^[^ ].*[}]$/; ++k) {
        }
        line[k] = line[k] " /** @endcond */"
    }
    if (line[i] ~ /^(class|struct) [a-z_]+::/) { # a specialisation for another library
        for (k = i; line[k - 1] ~ /^(template|\/\/\/| )/; --k) {
        }
        line[k - 1] = line[k - 1] "/** @cond */"
        for (k = i; k < NR && line[k] !~ /^};/; ++k) {
        }
        line[k] = line[k] " /** @endcond */"
    }
    if (line[i] ~ /^namespace ([a-z]+::)*detail [{]/) {
        line[i] = line[i] " /** @cond */"
        inside = 1
        return
    }
    if (!inside) {
        return
    }
    if (line[i] ~ /^} \/\/ namespace ([a-z]+::)*detail/) {
        line[i] = "/** @endcond */ " line[i]
        inside = 0
        return
    }
    if (line[i] ~ /^(class|struct) [a-z_0-9]+ *(:.*)?[{]?$/) {
        name = line[i]
        sub(/^(class|struct) /, "", name)
        sub(/[^a-z_0-9].*$/, "", name)
        if (is_shown[name] && line[i] !~ /;$/) {
            for (k = i; line[k - 1] ~ /^(template|\/\/\/| )/; --k) {
            }
            line[k - 1] = line[k - 1] "/** @endcond */"
            showing = 1
        }
    }
    if (showing && line[i] ~ /^};/) {
        line[i] = line[i] " /** @cond */"
        showing = 0
    }
    if (showing) {
        sub(/^protected:/, "private:", line[i])
    }
}
