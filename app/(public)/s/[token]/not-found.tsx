import { RefusedLink } from "@/components/share/refused-link";

/** A link that names nothing, answered with status 404. */
export default function UnknownLink() {
  return <RefusedLink code="link.unknown" />;
}
