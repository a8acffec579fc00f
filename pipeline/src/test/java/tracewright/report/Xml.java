package tracewright.report;

import java.io.IOException;
import java.io.StringReader;
import java.util.ArrayList;
import java.util.List;
import javax.xml.parsers.DocumentBuilder;
import javax.xml.parsers.DocumentBuilderFactory;
import javax.xml.parsers.ParserConfigurationException;
import org.w3c.dom.Document;
import org.w3c.dom.Element;
import org.w3c.dom.NodeList;
import org.xml.sax.InputSource;
import org.xml.sax.SAXException;
import org.xml.sax.SAXParseException;
import org.xml.sax.helpers.DefaultHandler;

/** Strict parsing of what the report wrote: the XML parser of the JDK, which accepts no unbalanced tag and no bare ampersand. */
final class Xml {

    private Xml() {
    }

    static Document parse(String text) {
        try {
            DocumentBuilder builder = DocumentBuilderFactory.newInstance().newDocumentBuilder();
            builder.setErrorHandler(new DefaultHandler() {
                @Override
                public void error(SAXParseException e) throws SAXException {
                    throw e;
                }

                @Override
                public void fatalError(SAXParseException e) throws SAXException {
                    throw e;
                }
            });
            return builder.parse(new InputSource(new StringReader(text)));
        } catch (SAXException | IOException | ParserConfigurationException e) {
            throw new AssertionError("not well-formed: " + e.getMessage(), e);
        }
    }

    static List<Element> all(Document document, String tag) {
        NodeList nodes = document.getElementsByTagName(tag);
        List<Element> list = new ArrayList<>();
        for (int i = 0; i < nodes.getLength(); i++) {
            list.add((Element) nodes.item(i));
        }
        return list;
    }

    static List<String> attributes(Document document, String name) {
        return all(document, "*").stream().filter(e -> e.hasAttribute(name)).map(e -> e.getAttribute(name)).toList();
    }
}
