package casefile

import "strconv"

// Schema is the JSON Schema (draft 2020-12) of the case file, made from the table that Parse reads by. What it cannot say
// are the rules that hold two numbers against each other (maximum mass and empty mass, rising tables, names that refer to
// a configuration); Parse checks those too.
func Schema() []byte {
	root := schemaObject(caseObject)
	head := node{kind: nodeObject, members: append([]pair{
		{"$schema", textNode("https://json-schema.org/draft/2020-12/schema")},
		{"$id", textNode("urn:levelspan:case:" + strconv.Itoa(formatVersion))},
		{"title", textNode(formatName)},
		{"description", textNode("One aeroplane, its conditions today, what is believed of it and its test runs. SI, with the unit in the key. Unknown keys are kept and have no effect.")},
	}, root.members...)}
	return append(appendPretty(nil, &head, 0), '\n')
}

func textNode(s string) node { return node{kind: nodeString, text: s} }

func countNode(n int) node { return node{kind: nodeNumber, text: strconv.Itoa(n)} }

func objectNode(members ...pair) node { return node{kind: nodeObject, members: members} }

func textsNode(texts ...string) node {
	n := node{kind: nodeArray}
	for _, s := range texts {
		n.items = append(n.items, textNode(s))
	}
	return n
}

func schemaObject(o *object) node {
	properties := node{kind: nodeObject}
	var required []string
	for i := range o.members {
		m := &o.members[i]
		properties.members = append(properties.members, pair{m.key, m.schema()})
		if m.shape == shapeConstant || m.required && m.kinds == nil || m.shape == shapeLeaf && m.field.Required && m.field.Kinds == nil {
			required = append(required, m.key)
		}
	}
	n := objectNode(pair{"type", textNode("object")})
	if required != nil {
		n.members = append(n.members, pair{"required", textsNode(required...)})
	}
	n.members = append(n.members, pair{"properties", properties})
	rules := o.kindRules()
	switch o {
	case aeroplaneObject:
		rules = append(rules, objectNode(
			pair{"if", has("propeller", objectNode(pair{"required", textsNode("kind")}, pair{"properties", objectNode(pair{"kind", objectNode(pair{"enum", textsNode(FixedPitch, Table)})})}))},
			pair{"then", objectNode(pair{"properties", objectNode(pair{"engine", objectNode(pair{"required", textsNode("rated_rpm")})})})}))
	case runObject:
		rules = append(rules,
			objectNode(pair{"if", has("kind", objectNode(pair{"enum", textsNode(LevelRun, ClimbRun)}))},
				pair{"then", objectNode(pair{"anyOf", node{kind: nodeArray, items: []node{has("power_fraction", aNumber()), has("rpm", aNumber())}}})}),
			objectNode(pair{"if", has("kind", objectNode(pair{"enum", textsNode(ClimbRun, GlideRun)}))},
				pair{"then", has("rate_mps", aNumber())}))
	}
	if rules != nil {
		n.members = append(n.members, pair{"allOf", node{kind: nodeArray, items: rules}})
	}
	return n
}

func aNumber() node { return objectNode(pair{"type", textNode("number")}) }

// has is the schema of an object that has a key, with a value of that schema.
func has(key string, value node) node {
	return objectNode(pair{"required", textsNode(key)}, pair{"properties", objectNode(pair{key, value})})
}

// kindRules says what each kind of an object needs.
func (o *object) kindRules() []node {
	if o.kind < 0 {
		return nil
	}
	var rules []node
	for _, kind := range o.members[o.kind].field.Choices {
		var required []string
		properties := node{kind: nodeObject}
		for i := range o.members {
			m := &o.members[i]
			switch {
			case m.shape == shapeLeaf && m.field.Required && m.field.Kinds != nil && m.field.Applies(kind):
				required = append(required, m.key)
				if m.field.Kind == KindChoice {
					properties.members = append(properties.members, pair{m.key, objectNode(pair{"enum", textsNode(m.field.Choices...)})})
				}
				if m.field.Kind == KindNumbers {
					properties.members = append(properties.members, pair{m.key, objectNode(pair{"minItems", countNode(3)})})
				}
			case m.shape == shapeList && m.kinds != nil && m.least(kind) > 0:
				required = append(required, m.key)
				properties.members = append(properties.members, pair{m.key, objectNode(pair{"minItems", countNode(m.least(kind))})})
			}
		}
		if required == nil {
			continue
		}
		then := objectNode(pair{"required", textsNode(required...)})
		if properties.members != nil {
			then.members = append(then.members, pair{"properties", properties})
		}
		rules = append(rules, objectNode(
			pair{"if", has("kind", objectNode(pair{"const", textNode(kind)}))},
			pair{"then", then}))
	}
	return rules
}

func (m *member) schema() node {
	var n node
	switch m.shape {
	case shapeConstant:
		if m.key == "format" {
			return objectNode(pair{"const", textNode(formatName)})
		}
		return objectNode(pair{"type", textNode("integer")}, pair{"minimum", countNode(1)}, pair{"maximum", countNode(formatVersion)})
	case shapeLeaf:
		return m.field.schema()
	case shapePart:
		n = schemaObject(m.object)
	case shapeMaybe:
		n = schemaObject(m.object)
		n.members[0].value = textsNode("object", "null")
	case shapeList:
		n = objectNode(pair{"type", textNode("array")}, pair{"maxItems", countNode(m.max)}, pair{"items", schemaObject(m.object)})
		if m.kinds == nil && m.min > 0 {
			n.members = append(n.members, pair{"minItems", countNode(m.min)})
		}
	}
	if m.help != "" {
		n.members = append([]pair{{"description", textNode(m.help)}}, n.members...)
	}
	return n
}

// The patterns of texts: no control characters, except tabs and line ends in long ones; not blank where it must be there.
const (
	shortPattern = `^[^\x00-\x1f\x7f-\x9f` + "\u2028\u2029" + `]*$`
	longPattern  = `^[^\x00-\x08\x0b-\x1f\x7f-\x9f` + "\u2028\u2029" + `]*$`
)

func (f *Field) schema() node {
	n := objectNode(pair{"description", textNode(f.describe())})
	add := func(key string, v node) { n.members = append(n.members, pair{key, v}) }
	number := func(n *node) {
		n.members = append(n.members, pair{"minimum", numberNode(f.Min)}, pair{"maximum", numberNode(f.Max)})
	}
	switch f.Kind {
	case KindNumber:
		add("type", textNode("number"))
		number(&n)
		if !f.Required && f.Otherwise == "" {
			add("default", numberNode(f.Default))
		}
	case KindMaybe:
		add("type", textsNode("number", "null"))
		number(&n)
		add("default", node{})
	case KindNumbers:
		items := aNumber()
		number(&items)
		add("type", textNode("array"))
		add("items", items)
		add("maxItems", countNode(maxRows))
		add("anyOf", node{kind: nodeArray, items: []node{objectNode(pair{"maxItems", countNode(0)}), objectNode(pair{"minItems", countNode(3)})}})
	case KindText:
		add("type", textNode("string"))
		add("minLength", countNode(int(f.Min)))
		add("maxLength", countNode(int(f.Max)))
		pattern := shortPattern
		if f.long() {
			pattern = longPattern
		}
		add("pattern", textNode(pattern))
		if f.Min > 0 {
			add("allOf", node{kind: nodeArray, items: []node{objectNode(pair{"pattern", textNode(`\S`)})}})
		}
		if !f.Required && f.Otherwise == "" {
			add("default", textNode(f.Text))
		}
	case KindChoice:
		choices := textsNode(f.Choices...)
		if f.Kinds != nil && f.Required {
			choices.items = append(choices.items, textNode(""))
		}
		add("enum", choices)
		if !f.Required {
			add("default", textNode(f.Text))
		}
	}
	return n
}

// describe is the field in words: its name, unit, help, and default where that is not a number.
func (f *Field) describe() string {
	s := f.Name
	if f.Unit != "" {
		s += ", " + f.Unit
	}
	s += "."
	if len(f.Kinds) > 0 {
		s += " For " + oneOf(f.Kinds) + "."
	}
	if f.Help != "" {
		s += " " + f.Help
	}
	if f.Otherwise != "" {
		s += " Default: " + f.Otherwise + "."
	}
	return s
}
