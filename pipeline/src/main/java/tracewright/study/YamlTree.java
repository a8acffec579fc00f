package tracewright.study;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import org.snakeyaml.engine.v2.api.LoadSettings;
import org.snakeyaml.engine.v2.api.lowlevel.Compose;
import org.snakeyaml.engine.v2.exceptions.MarkedYamlEngineException;
import org.snakeyaml.engine.v2.exceptions.YamlEngineException;
import org.snakeyaml.engine.v2.nodes.MappingNode;
import org.snakeyaml.engine.v2.nodes.Node;
import org.snakeyaml.engine.v2.nodes.NodeTuple;
import org.snakeyaml.engine.v2.nodes.ScalarNode;
import org.snakeyaml.engine.v2.nodes.SequenceNode;

/** YAML text as nodes that know their lines, with single keys replaced from the command line. */
final class YamlTree {

    private static final int LARGEST = 1 << 20;
    private static final int DEEPEST = 40;
    private static final String FIRST_LINE = "begin with 'schema: tracewright-study/1' or 'schema: tracewright-layout/1'";
    /** Tags that the notation of a value alone gives it. */
    private static final Set<String> IMPLICIT = Set.of("str", "int", "float", "bool", "null", "seq", "map");

    private YamlTree() {
    }

    /** Root mapping of a file. */
    static MappingNode read(Path file) {
        String text;
        try {
            text = Files.readString(file, StandardCharsets.UTF_8);
        } catch (java.nio.charset.CharacterCodingException e) {
            throw usage("the file is not UTF-8 text", file.toString(), "save it as UTF-8");
        } catch (IOException e) {
            throw usage("the file cannot be read: " + unreadable(file, e), file.toString(),
                "check the path; paths inside a study start from the study file's folder");
        }
        Node root = compose(text, file.toString());
        if (!(root instanceof MappingNode mapping)) {
            throw usage("the file holds no mapping of keys", file.toString(), FIRST_LINE);
        }
        return mapping;
    }

    private static String unreadable(Path file, IOException e) {
        if (Files.isDirectory(file)) {
            return "it is a folder";
        }
        return Files.exists(file) ? e.getMessage() : "there is no such file";
    }

    static Node compose(String text, String label) {
        LoadSettings settings = LoadSettings.builder().setLabel(label).setCodePointLimit(LARGEST).setMaxAliasesForCollections(50).build();
        try {
            Optional<Node> root = new Compose(settings).composeString(text);
            checkTree(root.orElseThrow(() -> usage("the text is empty", label, FIRST_LINE)), new ArrayList<>(), label);
            return root.get();
        } catch (MarkedYamlEngineException e) {
            String line = e.getProblemMark().map(m -> " line " + (m.getLine() + 1)).orElse("");
            throw usage("not valid YAML: " + e.getProblem(), label + line, "mend the syntax (indentation by spaces, a space after each colon)");
        } catch (YamlEngineException e) {
            throw usage("not valid YAML: " + e.getMessage(), label, "mend the syntax");
        } catch (StackOverflowError e) {
            throw usage("the YAML is nested too deeply", label, "stay below " + DEEPEST + " levels");
        }
    }

    /** Refuses what would make a walk over the nodes endless, and explicit tags. */
    private static void checkTree(Node node, List<Node> ancestors, String label) {
        if (ancestors.contains(node)) {
            throw usage("an anchor contains itself", where(node, label), "write the value out");
        }
        if (ancestors.size() > DEEPEST) {
            throw usage("the YAML is nested more than " + DEEPEST + " levels deep", where(node, label), "flatten it");
        }
        checkTag(node, label);
        ancestors.add(node);
        if (node instanceof MappingNode m) {
            m.getValue().forEach(t -> {
                checkTree(t.getKeyNode(), ancestors, label);
                checkTree(t.getValueNode(), ancestors, label);
            });
        } else if (node instanceof SequenceNode s) {
            s.getValue().forEach(v -> checkTree(v, ancestors, label));
        }
        ancestors.remove(ancestors.size() - 1);
    }

    private static void checkTag(Node node, String label) {
        String tag = node.getTag().getValue();
        String prefix = "tag:yaml.org,2002:";
        if (!tag.startsWith(prefix) || !IMPLICIT.contains(tag.substring(prefix.length()))) {
            throw usage("the tag " + tag + " is not supported", where(node, label), "remove it");
        }
    }

    /** File (or command line option) and line of a node. */
    static String where(Node node, String label) {
        return node.getStartMark().map(m -> m.getName().startsWith("--set") ? m.getName() : m.getName() + " line " + (m.getLine() + 1)).orElse(label);
    }

    /** Replaces or adds the values of dotted keys; entries of lists of named mappings are addressed by name or by number. */
    static void override(MappingNode root, Map<String, String> overrides) {
        List<Problem> problems = new ArrayList<>();
        overrides.forEach((key, value) -> {
            String label = "--set " + key + "=" + value;
            try {
                put(root, path(key, label), given(value, label), label);
            } catch (InputException e) {
                problems.addAll(e.problems());
            }
        });
        if (!problems.isEmpty()) {
            throw new InputException(InputException.Cause.USAGE, problems);
        }
    }

    private static List<String> path(String key, String label) {
        List<String> path = List.of(key.split("\\.", -1));
        if (path.stream().anyMatch(String::isBlank)) {
            throw usage("'" + key + "' is no key", label, "write names with dots between them, for instance renormalization.scale_gev");
        }
        return path;
    }

    private static Node given(String value, String label) {
        if (value.isBlank()) {
            throw usage("there is no value", label, "write one after the = sign");
        }
        return compose(value, label);
    }

    private static void put(Node at, List<String> path, Node value, String label) {
        String key = path.get(0);
        if (at instanceof SequenceNode sequence) {
            int i = index(sequence, key, label);
            if (path.size() == 1) {
                sequence.getValue().set(i, value);
            } else {
                Node child = unshared(sequence.getValue().get(i));
                sequence.getValue().set(i, child);
                put(child, path.subList(1, path.size()), value, label);
            }
        } else if (at instanceof MappingNode mapping) {
            putInMapping(mapping, path, value, label);
        } else {
            throw usage("'" + key + "' lies below a value that has no keys", label, "shorten the key");
        }
    }

    private static void putInMapping(MappingNode mapping, List<String> path, Node value, String label) {
        List<NodeTuple> tuples = mapping.getValue();
        for (int i = 0; i < tuples.size(); i++) {
            NodeTuple t = tuples.get(i);
            if (t.getKeyNode() instanceof ScalarNode k && k.getValue().equals(path.get(0))) {
                if (path.size() == 1) {
                    tuples.set(i, new NodeTuple(t.getKeyNode(), value));
                } else {
                    Node child = unshared(t.getValueNode());
                    tuples.set(i, new NodeTuple(t.getKeyNode(), child));
                    put(child, path.subList(1, path.size()), value, label);
                }
                return;
            }
        }
        Node child = value;
        for (int i = path.size() - 1; i > 0; i--) {
            MappingNode wrapped = (MappingNode) compose("{}", label);
            wrapped.getValue().add(new NodeTuple(compose(path.get(i), label), child));
            child = wrapped;
        }
        tuples.add(new NodeTuple(compose(path.get(0), label), child));
    }

    /** A copy of a node that may be changed although an alias elsewhere stands for the same one; children stay shared. */
    private static Node unshared(Node node) {
        if (node instanceof MappingNode m) {
            return new MappingNode(m.getTag(), true, new ArrayList<>(m.getValue()), m.getFlowStyle(), m.getStartMark(), m.getEndMark());
        }
        if (node instanceof SequenceNode s) {
            return new SequenceNode(s.getTag(), true, new ArrayList<>(s.getValue()), s.getFlowStyle(), s.getStartMark(), s.getEndMark());
        }
        return node;
    }

    private static int index(SequenceNode sequence, String key, String label) {
        List<String> names = new ArrayList<>();
        for (int i = 0; i < sequence.getValue().size(); i++) {
            String name = name(sequence.getValue().get(i)).orElse(Integer.toString(i));
            names.add(name);
            if (name.equals(key) || Integer.toString(i).equals(key)) {
                return i;
            }
        }
        throw usage("the list has no entry '" + key + "'", label, Nearest.advice(key, names));
    }

    /** Value of the key {@code name} of a mapping. */
    static Optional<String> name(Node node) {
        if (node instanceof MappingNode m) {
            for (NodeTuple t : m.getValue()) {
                if (t.getKeyNode() instanceof ScalarNode k && k.getValue().equals("name") && t.getValueNode() instanceof ScalarNode v) {
                    return Optional.of(v.getValue());
                }
            }
        }
        return Optional.empty();
    }

    static InputException usage(String what, String where, String remedy) {
        return new InputException(InputException.Cause.USAGE, List.of(new Problem(what, where, remedy)));
    }
}
